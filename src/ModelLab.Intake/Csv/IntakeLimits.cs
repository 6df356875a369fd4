namespace ModelLab.Intake.Csv;

/// <summary>Bounds of what is read. They keep a hostile file from filling the memory, and lie well above tables for regression.</summary>
public static class IntakeLimits
{
    /// <summary>Most columns of a table.</summary>
    public const int Columns = 5_000;

    /// <summary>Longest cell, in bytes of UTF-8.</summary>
    public const int CellBytes = 65_536;

    /// <summary>Longest row, in bytes of UTF-8.</summary>
    public const int RowBytes = 4 << 20;

    /// <summary>Longest name of a column, in characters.</summary>
    public const int NameCharacters = 200;

    /// <summary>Most problems told at once.</summary>
    public const int Problems = 100;

    /// <summary>Most distinct values counted in one column.</summary>
    public const int DistinctPerColumn = 10_000;

    /// <summary>Most distinct values counted in all columns together; in very wide tables each column gets its share.</summary>
    public const int DistinctInTable = 2_000_000;

    /// <summary>Most distinct values listed with their counts.</summary>
    public const int ListedValues = 100;
}
