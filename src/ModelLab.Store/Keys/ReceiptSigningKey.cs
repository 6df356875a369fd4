using System.Security.Cryptography;
using System.Text;

namespace ModelLab.Store.Keys;

/// <summary>The server's key for signing receipts: ECDSA on P-256 (FIPS 186-5), in a PEM file of its own.</summary>
public sealed class ReceiptSigningKey(StorePaths paths)
{
    /// <summary>Opens the key, making it where there is none yet. The caller disposes of it.</summary>
    /// <exception cref="KeysUnusableException">The file holds no such key.</exception>
    public ECDsa Open()
    {
        if (!File.Exists(paths.ReceiptSigningKeyFile))
        {
            var made = ECDsa.Create(ECCurve.NamedCurves.nistP256);
            PrivateFiles.WriteNew(paths.ReceiptSigningKeyFile, Encoding.ASCII.GetBytes(made.ExportPkcs8PrivateKeyPem() + "\n"));
            return made;
        }

        var key = ECDsa.Create();
        try
        {
            key.ImportFromPem(File.ReadAllText(paths.ReceiptSigningKeyFile));
        }
        catch (Exception e) when (e is ArgumentException or CryptographicException)
        {
            key.Dispose();
            throw new KeysUnusableException($"{paths.ReceiptSigningKeyFile} holds no signing key. Put it back from the backup of the keys.", e);
        }

        if (key.KeySize != 256)
        {
            key.Dispose();
            throw new KeysUnusableException($"{paths.ReceiptSigningKeyFile} holds a key of {key.KeySize} bits; receipts are signed on P-256.");
        }

        return key;
    }
}
