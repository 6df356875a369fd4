using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace ModelLab.Store.Ledgers;

/// <summary>What an entry copied from a source, encrypted under the source's key. The ciphertext never changes.</summary>
public sealed class SealedPartRow
{
    /// <summary>Id of the project.</summary>
    public required string LedgerId { get; init; }

    /// <summary>Number of the entry.</summary>
    public required long EntryNumber { get; init; }

    /// <summary>Under whose key.</summary>
    public required string SourceId { get; init; }

    /// <summary>Nonce, 12 bytes.</summary>
    public required byte[] Nonce { get; init; }

    /// <summary>Salt and canonical content, encrypted; the tag at the end.</summary>
    public required byte[] Ciphertext { get; init; }
}

/// <summary>Table <c>sealed_parts</c>.</summary>
internal sealed class SealedPartConfiguration : IEntityTypeConfiguration<SealedPartRow>
{
    public void Configure(EntityTypeBuilder<SealedPartRow> builder)
    {
        builder.ToTable("sealed_parts");
        builder.HasKey(p => new { p.LedgerId, p.EntryNumber });
        builder.Property(p => p.LedgerId).HasColumnName("ledger_id").HasMaxLength(64);
        builder.Property(p => p.EntryNumber).HasColumnName("entry_number").ValueGeneratedNever();
        builder.Property(p => p.SourceId).HasColumnName("source_id").HasMaxLength(64);
        builder.Property(p => p.Nonce).HasColumnName("nonce");
        builder.Property(p => p.Ciphertext).HasColumnName("ciphertext");
        builder.HasOne<LedgerEntryRow>().WithOne().HasForeignKey<SealedPartRow>(p => new { p.LedgerId, p.EntryNumber }).OnDelete(DeleteBehavior.Restrict);
    }
}
