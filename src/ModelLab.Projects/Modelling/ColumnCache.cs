using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Modelling;

/// <summary>
/// Columns in memory, so that a decision need not read the source again. Least recently used columns go when the budget is
/// spent. A cache only: the source's bytes are the truth.
/// </summary>
/// <param name="budget">Bytes that may be held.</param>
public sealed class ColumnCache(long budget = 256L << 20)
{
    private readonly Lock gate = new();
    private readonly Dictionary<string, LinkedListNode<Held>> byKey = new(StringComparer.Ordinal);
    private readonly LinkedList<Held> recent = new();
    private long bytes;

    /// <summary>The column of a key, or null.</summary>
    public Column? Find(string key)
    {
        lock (gate)
        {
            if (!byKey.TryGetValue(key, out var node))
            {
                return null;
            }

            recent.Remove(node);
            recent.AddFirst(node);
            return node.Value.Column;
        }
    }

    /// <summary>Holds a column; one larger than the budget is not held.</summary>
    public void Put(string key, Column column)
    {
        var size = Size(column);
        lock (gate)
        {
            if (size > budget || byKey.ContainsKey(key))
            {
                return;
            }

            byKey[key] = recent.AddFirst(new Held(key, column, size));
            bytes += size;
            while (bytes > budget)
            {
                var oldest = recent.Last!;
                recent.RemoveLast();
                byKey.Remove(oldest.Value.Key);
                bytes -= oldest.Value.Size;
            }
        }
    }

    private static long Size(Column column) =>
        column is NumberColumn number ? 8L * (number.Values.Length + number.Remainders.Length) : 4L * column.Rows;

    private sealed record Held(string Key, Column Column, long Size);
}
