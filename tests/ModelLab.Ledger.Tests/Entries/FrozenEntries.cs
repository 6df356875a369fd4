using ModelLab.Ledger.Entries;

namespace ModelLab.Ledger.Tests.Entries;

/// <summary>
/// Checks the frozen bytes of entry kinds. A folder holds for each kind and version one entry as it was stored when the
/// version was new, <c>name-version.bin</c>, and <c>hashes.txt</c> with a line <c>hash name/version</c> for each. Neither
/// is ever made again: when a check fails, the program has changed what it writes or reads, not the file. Other test
/// projects compile this file too and keep their kinds in folders of their own.
/// </summary>
internal static class FrozenEntries
{
    /// <summary>Lists everything wrong; empty for nothing.</summary>
    /// <param name="folder">The folder.</param>
    /// <param name="kinds">Every kind in every version that the program can read.</param>
    /// <param name="read">Reads an entry's body as the program does; throws where it cannot.</param>
    public static IReadOnlyList<string> Problems(string folder, IEnumerable<string> kinds, Action<LedgerEntry> read)
    {
        var hashes = File.ReadAllLines(Path.Combine(folder, "hashes.txt"))
            .Where(l => l.Length > 0).ToDictionary(l => l.Split(' ')[1], l => l.Split(' ')[0], StringComparer.Ordinal);
        var files = Directory.GetFiles(folder, "*.bin").ToDictionary(f => Path.GetFileNameWithoutExtension(f)!, StringComparer.Ordinal);
        var problems = new List<string>();
        foreach (var kind in kinds.Union(hashes.Keys).Order(StringComparer.Ordinal))
        {
            if (!hashes.TryGetValue(kind, out var hash) || !files.Remove(kind.Replace('/', '-'), out var file))
            {
                problems.Add($"{kind}: no frozen entry, or no hash of it");
                continue;
            }

            try
            {
                var entry = LedgerEntry.Parse(File.ReadAllBytes(file));
                if (entry.Kind != kind || entry.Hash.ToString() != hash)
                {
                    problems.Add($"{kind}: the frozen entry is a {entry.Kind} of hash {entry.Hash}");
                }

                read(entry);
            }
            catch (Exception e)
            {
                problems.Add($"{kind}: {e.Message}");
            }
        }

        problems.AddRange(files.Keys.Select(f => $"{f}: a file that no kind and no hash speaks of"));
        return problems;
    }
}
