using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Ledger;

namespace ModelLab.Store.Vault;

/// <summary>A source in the vault. An orphan until an entry adopts it.</summary>
public sealed class SourceRow
{
    /// <summary>Id of the project.</summary>
    public required string ProjectId { get; init; }

    /// <summary>Id within the project.</summary>
    public required string SourceId { get; init; }

    /// <summary>SHA-256 of the bytes as received; zero until all have come.</summary>
    public Sha256Hash Sha256 { get; set; }

    /// <summary>Their number.</summary>
    public long Bytes { get; set; }

    /// <summary>Number of chunks; 0 until all have come, since even an empty source has one.</summary>
    public int Chunks { get; set; }

    /// <summary>When receiving began.</summary>
    public required DateTimeOffset ReceivedAt { get; init; }

    /// <summary>Whether an entry took it up.</summary>
    public bool Adopted { get; set; }

    /// <summary>When.</summary>
    public DateTimeOffset? AdoptedAt { get; set; }
}

/// <summary>Table <c>sources</c>.</summary>
internal sealed class SourceConfiguration : IEntityTypeConfiguration<SourceRow>
{
    public void Configure(EntityTypeBuilder<SourceRow> builder)
    {
        builder.ToTable("sources");
        builder.HasKey(s => new { s.ProjectId, s.SourceId });
        builder.Property(s => s.ProjectId).HasColumnName("project_id").HasMaxLength(64);
        builder.Property(s => s.SourceId).HasColumnName("source_id").HasMaxLength(64);
        builder.Property(s => s.Sha256).HasColumnName("sha256");
        builder.Property(s => s.Bytes).HasColumnName("bytes");
        builder.Property(s => s.Chunks).HasColumnName("chunks");
        builder.Property(s => s.ReceivedAt).HasColumnName("received_at");
        builder.Property(s => s.Adopted).HasColumnName("adopted");
        builder.Property(s => s.AdoptedAt).HasColumnName("adopted_at");
        builder.HasIndex(s => new { s.Adopted, s.ReceivedAt }).HasDatabaseName("sources_by_adoption");
    }
}
