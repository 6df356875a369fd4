namespace ModelLab.Statistics.Designs;

/// <summary>Columns of equal length with distinct names.</summary>
public sealed class DataTable
{
    private readonly Dictionary<string, Column> byName;

    /// <summary>Puts columns together.</summary>
    /// <exception cref="ArgumentException">Lengths differ or a name occurs twice.</exception>
    public DataTable(IReadOnlyList<Column> columns)
    {
        Columns = columns;
        Rows = columns.Count == 0 ? 0 : columns[0].Rows;
        byName = new Dictionary<string, Column>(StringComparer.Ordinal);
        foreach (var column in columns)
        {
            if (column.Rows != Rows)
            {
                throw new ArgumentException($"Column '{column.Name}' has {column.Rows} rows where '{columns[0].Name}' has {Rows}.", nameof(columns));
            }

            if (!byName.TryAdd(column.Name, column))
            {
                throw new ArgumentException($"Two columns are named '{column.Name}'.", nameof(columns));
            }
        }
    }

    /// <summary>The columns in their order.</summary>
    public IReadOnlyList<Column> Columns { get; }

    /// <summary>Number of rows.</summary>
    public int Rows { get; }

    /// <summary>The column of a name, or null.</summary>
    public Column? Find(string name) => byName.GetValueOrDefault(name);
}
