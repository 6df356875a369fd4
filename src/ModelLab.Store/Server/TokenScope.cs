namespace ModelLab.Store.Server;

/// <summary>What an API token may do. No token signs.</summary>
public enum TokenScope
{
    /// <summary>Look.</summary>
    Read,

    /// <summary>Look and act as its person may.</summary>
    Write,
}
