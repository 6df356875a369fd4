using System.Numerics;
using ModelLab.Ledger.Entries;

namespace ModelLab.Ledger.Verification;

/// <summary>Compares the head computed from the entries with one kept apart from them.</summary>
internal static class HeadComparison
{
    /// <summary>What differs, or null.</summary>
    public static Difference? Compare(LedgerHead computed, LedgerHead stored)
    {
        if (computed.LedgerId != stored.LedgerId)
        {
            return new Difference(null, $"The stored head belongs to the ledger '{stored.LedgerId}', not to '{computed.LedgerId}'.");
        }

        if (computed.Count < stored.Count)
        {
            return new Difference(
                computed.Count + 1,
                $"The stored head counts {stored.Count} entries and {computed.Count} are there: the tail from entry {computed.Count + 1} on is missing.");
        }

        if (computed.Count > stored.Count)
        {
            return new Difference(
                stored.Count + 1,
                $"The stored head counts {stored.Count} entries and {computed.Count} are there: those from entry {stored.Count + 1} on were never acknowledged.");
        }

        if (stored.Count < 0 || stored.Frontier.Count != BitOperations.PopCount((ulong)stored.Count))
        {
            return new Difference(null, $"The stored head contradicts itself: {stored.Count} entries do not make {stored.Frontier.Count} complete subtrees.");
        }

        return CompareFrontiers(computed, stored)
            ?? (computed.LastHash == stored.LastHash
                ? null
                : new Difference(null, "The stored head's last hash is not that of the last entry, though its tree fits the entries: the head was altered."));
    }

    private static Difference? CompareFrontiers(LedgerHead computed, LedgerHead stored)
    {
        long first = 1;
        var rest = (ulong)computed.Count;
        for (var i = 0; i < computed.Frontier.Count; i++)
        {
            var size = 1L << BitOperations.Log2(rest);
            rest -= (ulong)size;
            if (computed.Frontier[i] != stored.Frontier[i])
            {
                return new Difference(
                    size == 1 ? first : null,
                    $"The entries are not those the stored head was made of: the first difference lies in {Range(first, first + size - 1)}.");
            }

            first += size;
        }

        return null;
    }

    private static string Range(long first, long last) => first == last ? $"entry {first}" : $"entries {first} to {last}";
}

/// <summary>A difference from what was kept apart.</summary>
/// <param name="FirstBad">Number of the first entry at fault, where it can be told.</param>
/// <param name="Problem">One sentence.</param>
internal sealed record Difference(long? FirstBad, string Problem);
