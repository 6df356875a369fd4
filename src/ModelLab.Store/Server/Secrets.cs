using System.Buffers.Text;
using System.Security.Cryptography;
using System.Text;

namespace ModelLab.Store.Server;

/// <summary>Secrets that people carry: 256 random bits. Only their SHA-256 is stored; it cannot be turned back.</summary>
internal static class Secrets
{
    /// <summary>A new secret, safe in addresses and command lines.</summary>
    public static string New(string prefix) => prefix + Base64Url.EncodeToString(RandomNumberGenerator.GetBytes(32));

    /// <summary>What is stored of it.</summary>
    public static byte[] Hash(string secret) => SHA256.HashData(Encoding.UTF8.GetBytes(secret));
}
