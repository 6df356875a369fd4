using System.Runtime.InteropServices;
using System.Text;

namespace ModelLab.Intake.Csv.Profiling;

/// <summary>Counts distinct values by their hashes up to a cap; keeps texts only while there are few.</summary>
/// <param name="cap">Distinct values counted at most.</param>
internal sealed class DistinctTally(int cap)
{
    private Dictionary<ulong, long>? counts = [];
    private Dictionary<ulong, string>? texts = [];

    /// <summary>Distinct values met, up to the cap.</summary>
    internal long Distinct { get; private set; }

    /// <summary>Whether counting stopped at the cap.</summary>
    internal bool Capped => counts is null;

    /// <summary>Whether a value came again while counting.</summary>
    internal bool AnyRepeated { get; private set; }

    /// <summary>Counts a value; true where it was met for the first time.</summary>
    internal bool Add(ReadOnlySpan<byte> value)
    {
        if (counts is null)
        {
            return false;
        }

        var hash = TextHash.Of(value);
        ref var count = ref CollectionsMarshal.GetValueRefOrAddDefault(counts, hash, out var known);
        if (known)
        {
            count++;
            AnyRepeated = true;
            return false;
        }

        if (Distinct == cap)
        {
            counts = null;
            return false;
        }

        count = 1;
        Distinct++;
        if (Distinct > IntakeLimits.ListedValues)
        {
            texts = null;
        }

        texts?.Add(hash, Encoding.UTF8.GetString(value));
        return true;
    }

    /// <summary>The values with their counts in ordinal order, or none where there are more than are listed.</summary>
    internal IReadOnlyList<ValueCount> Values()
    {
        if (texts is null || counts is null)
        {
            return [];
        }

        return [.. texts.Select(t => new ValueCount(t.Value, counts[t.Key])).OrderBy(v => v.Value, StringComparer.Ordinal)];
    }
}
