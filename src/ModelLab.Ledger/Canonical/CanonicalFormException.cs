namespace ModelLab.Ledger.Canonical;

/// <summary>Bytes are not JSON in canonical form (RFC 8785), or not of the shape expected.</summary>
public sealed class CanonicalFormException : FormatException
{
    /// <summary>Says where and what.</summary>
    /// <param name="position">Offset of the byte at fault, from 0.</param>
    /// <param name="problem">What is wrong there, a sentence part without a full stop.</param>
    public CanonicalFormException(long position, string problem)
        : base($"Byte {position}: {problem}.") => Position = position;

    /// <summary>Offset of the byte at fault, from 0.</summary>
    public long Position { get; }
}
