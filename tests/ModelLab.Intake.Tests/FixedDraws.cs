using CsCheck;

namespace ModelLab.Intake.Tests;

/// <summary>The same draws in every run: a seed given to <c>Sample</c> would fix the first draw only.</summary>
internal static class FixedDraws
{
    /// <summary>Checks that many draws; a failure names the draw, which comes again in the next run.</summary>
    internal static void Each<T>(Gen<T> draws, ulong seed, int count, Action<T> check)
    {
        var random = new PCG(1, seed);
        for (var i = 0; i < count; i++)
        {
            var draw = draws.Generate(random, null, out _);
            try
            {
                check(draw);
            }
            catch (Exception failure)
            {
                throw new InvalidOperationException($"Draw {i} of seed {seed} fails: {failure.Message} ({draw})", failure);
            }
        }
    }
}
