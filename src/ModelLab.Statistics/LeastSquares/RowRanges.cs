namespace ModelLab.Statistics.LeastSquares;

/// <summary>
/// How the rows of a design are cut: blocks that fit the cache, and stretches of blocks that may be worked on at the same time.
/// Both sizes are fixed, and what stretches give is put together in their order, so that no figure depends on the number of threads.
/// </summary>
internal static class RowRanges
{
    /// <summary>Rows in a block.</summary>
    public const int Block = 512;

    /// <summary>Rows in a stretch.</summary>
    public const int Stretch = 64 * Block;

    /// <summary>Number of stretches that <paramref name="rows"/> rows make.</summary>
    public static int Stretches(int rows) => (rows + Stretch - 1) / Stretch;

    /// <summary>Number of blocks that <paramref name="rows"/> rows make.</summary>
    public static int Blocks(int rows) => (rows + Block - 1) / Block;

    /// <summary>Runs the work of every stretch: its number, its first row, the row behind its last.</summary>
    public static void ForEachStretch(int rows, Action<int, int, int> work)
    {
        var stretches = Stretches(rows);
        if (stretches == 1)
        {
            work(0, 0, rows);
            return;
        }

        Parallel.For(0, stretches, stretch => work(stretch, stretch * Stretch, Math.Min(rows, (stretch + 1) * Stretch)));
    }
}
