namespace ModelLab.Architecture.Tests.Specimens;

/// <summary>Breaks the rule of named results in each way that it knows, on purpose.</summary>
public class NamelessResults
{
    public static (double Lower, double Upper) Interval() => (0, 1);

    public static Task<IReadOnlyList<(int Row, double Value)>> Inside() => Task.FromResult<IReadOnlyList<(int Row, double Value)>>([]);

    public static double[][] Table() => [];

    public static void Takes(double[,] matrix) => ArgumentNullException.ThrowIfNull(matrix);

    public static object[] Anything() => [];

    public static double[] Harmless() => [];

    protected Tuple<int, int> Pair { get; } = new(1, 2);

    internal static (int Row, int Column) NotPublic() => (1, 2);
}
