namespace ModelLab.Intake.Csv.Reading;

/// <summary>Values of a column whose length is not known beforehand, in chunks, so that growing copies nothing.</summary>
internal sealed class ChunkedValues<T>
{
    private const int ChunkLength = 1 << 14;

    private readonly List<T[]> chunks = [];

    /// <summary>How many values.</summary>
    internal int Count { get; private set; }

    /// <summary>Appends a value.</summary>
    internal void Add(T value)
    {
        var offset = Count % ChunkLength;
        if (offset == 0)
        {
            chunks.Add(new T[ChunkLength]);
        }

        chunks[^1][offset] = value;
        Count++;
    }

    /// <summary>The values as one array. The chunks are given up: to be called once, at the end.</summary>
    internal T[] ToArray()
    {
        var values = new T[Count];
        for (var i = 0; i < chunks.Count; i++)
        {
            var start = i * ChunkLength;
            chunks[i].AsSpan(0, Math.Min(ChunkLength, Count - start)).CopyTo(values.AsSpan(start));
            chunks[i] = [];
        }

        chunks.Clear();
        return values;
    }
}
