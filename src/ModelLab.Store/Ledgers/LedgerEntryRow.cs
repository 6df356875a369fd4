using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Ledger;

namespace ModelLab.Store.Ledgers;

/// <summary>An entry as stored. Never changed, never removed.</summary>
public sealed class LedgerEntryRow
{
    /// <summary>Id of the project, or <c>server</c>.</summary>
    public required string LedgerId { get; init; }

    /// <summary>From 1 without gaps.</summary>
    public required long Number { get; init; }

    /// <summary>The bytes that were hashed.</summary>
    public required byte[] CanonicalBytes { get; init; }

    /// <summary>Hash of the entry.</summary>
    public required Sha256Hash Hash { get; init; }
}

/// <summary>Table <c>ledger_entries</c>.</summary>
internal sealed class LedgerEntryConfiguration : IEntityTypeConfiguration<LedgerEntryRow>
{
    public void Configure(EntityTypeBuilder<LedgerEntryRow> builder)
    {
        builder.ToTable("ledger_entries");
        builder.HasKey(e => new { e.LedgerId, e.Number });
        builder.Property(e => e.LedgerId).HasColumnName("ledger_id").HasMaxLength(64);
        builder.Property(e => e.Number).HasColumnName("number").ValueGeneratedNever();
        builder.Property(e => e.CanonicalBytes).HasColumnName("canonical_bytes");
        builder.Property(e => e.Hash).HasColumnName("hash");
    }
}
