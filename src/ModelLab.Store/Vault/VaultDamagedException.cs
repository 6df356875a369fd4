namespace ModelLab.Store.Vault;

/// <summary>What lies in the vault is not what was stored there: changed, cut, moved, or encrypted under another key.</summary>
public sealed class VaultDamagedException(string message, Exception? inner = null) : IOException(message, inner);
