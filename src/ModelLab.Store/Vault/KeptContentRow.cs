using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Ledger;

namespace ModelLab.Store.Vault;

/// <summary>Content that entries name by its hash, encrypted under a source's key.</summary>
public sealed class KeptContentRow
{
    /// <summary>Id of the project.</summary>
    public required string ProjectId { get; init; }

    /// <summary>SHA-256 of the content.</summary>
    public required Sha256Hash Hash { get; init; }

    /// <summary>Under whose key.</summary>
    public required string SourceId { get; init; }

    /// <summary>Nonce, 12 bytes.</summary>
    public required byte[] Nonce { get; init; }

    /// <summary>Packed content, encrypted; the tag at the end.</summary>
    public required byte[] Ciphertext { get; init; }
}

/// <summary>Table <c>kept_contents</c>.</summary>
internal sealed class KeptContentConfiguration : IEntityTypeConfiguration<KeptContentRow>
{
    public void Configure(EntityTypeBuilder<KeptContentRow> builder)
    {
        builder.ToTable("kept_contents");
        builder.HasKey(c => new { c.ProjectId, c.Hash, c.SourceId });
        builder.Property(c => c.ProjectId).HasColumnName("project_id").HasMaxLength(64);
        builder.Property(c => c.Hash).HasColumnName("hash");
        builder.Property(c => c.SourceId).HasColumnName("source_id").HasMaxLength(64);
        builder.Property(c => c.Nonce).HasColumnName("nonce");
        builder.Property(c => c.Ciphertext).HasColumnName("ciphertext");
    }
}
