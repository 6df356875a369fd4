namespace ModelLab.Statistics.Distributions;

/// <summary>Student's t.</summary>
public static class StudentT
{
    /// <summary>P(|T| ≥ |t|) on <paramref name="df"/> &gt; 0 degrees of freedom, computed directly (never 1 − CDF).</summary>
    public static double TwoSided(double t, double df) => throw new NotImplementedException();

    /// <summary>P(T ≥ t).</summary>
    public static double UpperTail(double t, double df) => throw new NotImplementedException();

    /// <summary>The t with P(T ≥ t) = <paramref name="upperTail"/>, 0 &lt; upperTail &lt; 1.</summary>
    public static double UpperQuantile(double upperTail, double df) => throw new NotImplementedException();
}

/// <summary>Fisher's F.</summary>
public static class FisherF
{
    /// <summary>P(F ≥ f) on (df1, df2).</summary>
    public static double UpperTail(double f, double df1, double df2) => throw new NotImplementedException();

    /// <summary>The f with P(F ≥ f) = <paramref name="upperTail"/>.</summary>
    public static double UpperQuantile(double upperTail, double df1, double df2) => throw new NotImplementedException();
}

/// <summary>Chi-squared.</summary>
public static class ChiSquared
{
    /// <summary>P(χ² ≥ x).</summary>
    public static double UpperTail(double x, double df) => throw new NotImplementedException();

    /// <summary>The x with P(χ² ≥ x) = <paramref name="upperTail"/>.</summary>
    public static double UpperQuantile(double upperTail, double df) => throw new NotImplementedException();
}

/// <summary>Standard normal.</summary>
public static class Normal
{
    /// <summary>P(Z ≥ z).</summary>
    public static double UpperTail(double z) => throw new NotImplementedException();

    /// <summary>The z with P(Z ≥ z) = <paramref name="upperTail"/>.</summary>
    public static double UpperQuantile(double upperTail) => throw new NotImplementedException();
}
