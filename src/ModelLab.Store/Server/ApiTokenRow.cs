using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Store.Accounts;

namespace ModelLab.Store.Server;

/// <summary>An API token; of its secret only the hash is kept.</summary>
public sealed class ApiTokenRow
{
    /// <summary>Id; not secret.</summary>
    public required string Id { get; init; }

    /// <summary>Whose.</summary>
    public required string PersonId { get; init; }

    /// <summary>What it is for, in the person's words.</summary>
    public required string Name { get; init; }

    /// <summary>What it may do.</summary>
    public required TokenScope Scope { get; init; }

    /// <summary>SHA-256 of the secret, which is 256 random bits and so needs no slow hash.</summary>
    public required byte[] SecretHash { get; init; }

    /// <summary>When it was issued.</summary>
    public required DateTimeOffset IssuedAt { get; init; }

    /// <summary>From when on it is refused.</summary>
    public required DateTimeOffset ExpiresAt { get; init; }

    /// <summary>When it was revoked, or null.</summary>
    public DateTimeOffset? RevokedAt { get; set; }

    /// <summary>When it was last used, to the minute, or null.</summary>
    public DateTimeOffset? LastUsedAt { get; set; }
}

/// <summary>Table <c>api_tokens</c>.</summary>
internal sealed class ApiTokenConfiguration : IEntityTypeConfiguration<ApiTokenRow>
{
    public void Configure(EntityTypeBuilder<ApiTokenRow> builder)
    {
        builder.ToTable("api_tokens");
        builder.HasKey(t => t.Id);
        builder.Property(t => t.Id).HasColumnName("id").HasMaxLength(64);
        builder.Property(t => t.PersonId).HasColumnName("person_id").HasMaxLength(64);
        builder.Property(t => t.Name).HasColumnName("name").HasMaxLength(200);
        builder.Property(t => t.Scope).HasColumnName("scope").HasConversion<string>().HasMaxLength(16);
        builder.Property(t => t.SecretHash).HasColumnName("secret_hash");
        builder.Property(t => t.IssuedAt).HasColumnName("issued_at");
        builder.Property(t => t.ExpiresAt).HasColumnName("expires_at");
        builder.Property(t => t.RevokedAt).HasColumnName("revoked_at");
        builder.Property(t => t.LastUsedAt).HasColumnName("last_used_at");
        builder.HasIndex(t => t.SecretHash).IsUnique().HasDatabaseName("api_tokens_by_secret");
        builder.HasOne<Account>().WithMany().HasForeignKey(t => t.PersonId).OnDelete(DeleteBehavior.Restrict);
    }
}
