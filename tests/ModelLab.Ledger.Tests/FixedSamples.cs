using CsCheck;

namespace ModelLab.Ledger.Tests;

/// <summary>Property checks over random inputs that are the same at every run, so that a failure can be met again.</summary>
internal static class FixedSamples
{
    public static void Check<T>(Gen<T> gen, int samples, Action<T> property)
    {
        var random = new PCG(1, 20260301UL);
        for (var i = 0; i < samples; i++)
        {
            var value = gen.Generate(random, null, out _);
            try
            {
                property(value);
            }
            catch (Exception e)
            {
                throw new InvalidOperationException($"Sample {i} of {samples}: {value}", e);
            }
        }
    }
}
