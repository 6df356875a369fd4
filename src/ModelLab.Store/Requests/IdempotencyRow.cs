using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Ledger;

namespace ModelLab.Store.Requests;

/// <summary>A request that came with an idempotency key, and its answer once there is one.</summary>
public sealed class IdempotencyRow
{
    /// <summary>Who sent it.</summary>
    public required string PersonId { get; init; }

    /// <summary>The key that the sender gave.</summary>
    public required string Key { get; init; }

    /// <summary>Hash of method, path and body, so that a key is not used for two requests.</summary>
    public required Sha256Hash RequestHash { get; init; }

    /// <summary>HTTP status of the answer; 0 while there is none.</summary>
    public int Status { get; set; }

    /// <summary>Content type of the answer, or null.</summary>
    public string? ContentType { get; set; }

    /// <summary>Body of the answer.</summary>
    public byte[] Body { get; set; } = [];

    /// <summary>When the request came.</summary>
    public required DateTimeOffset CreatedAt { get; init; }
}

/// <summary>Table <c>idempotency_records</c>.</summary>
internal sealed class IdempotencyConfiguration : IEntityTypeConfiguration<IdempotencyRow>
{
    public void Configure(EntityTypeBuilder<IdempotencyRow> builder)
    {
        builder.ToTable("idempotency_records");
        builder.HasKey(r => new { r.PersonId, r.Key });
        builder.Property(r => r.PersonId).HasColumnName("person_id").HasMaxLength(64);
        builder.Property(r => r.Key).HasColumnName("key").HasMaxLength(200);
        builder.Property(r => r.RequestHash).HasColumnName("request_hash");
        builder.Property(r => r.Status).HasColumnName("status");
        builder.Property(r => r.ContentType).HasColumnName("content_type").HasMaxLength(200);
        builder.Property(r => r.Body).HasColumnName("body");
        builder.Property(r => r.CreatedAt).HasColumnName("created_at");
        builder.HasIndex(r => r.CreatedAt).HasDatabaseName("idempotency_records_by_time");
    }
}
