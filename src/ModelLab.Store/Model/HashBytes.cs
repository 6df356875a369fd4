using Microsoft.EntityFrameworkCore.Storage.ValueConversion;
using ModelLab.Ledger;

namespace ModelLab.Store.Model;

/// <summary>Hashes as their 32 bytes.</summary>
internal sealed class HashBytes() : ValueConverter<Sha256Hash, byte[]>(hash => ToBytes(hash), stored => ToHash(stored))
{
    // An expression may not hold a span; a call may.
    private static byte[] ToBytes(Sha256Hash hash) => hash.Bytes.ToArray();

    private static Sha256Hash ToHash(byte[] stored) => new(stored);
}
