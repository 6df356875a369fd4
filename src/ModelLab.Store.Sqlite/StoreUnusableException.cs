namespace ModelLab.Store.Sqlite;

/// <summary>The store cannot be used as it lies there; the message says why and what to do. Nothing was changed.</summary>
public sealed class StoreUnusableException(string message, Exception? inner = null) : Exception(message, inner);
