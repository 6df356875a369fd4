using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace ModelLab.Store.Server;

/// <summary>A single value that concerns the whole store.</summary>
public sealed class StoreFactRow
{
    /// <summary>Random id of this store, told to backups.</summary>
    public const string StoreId = "store-id";

    /// <summary>Version of the read models as stored.</summary>
    public const string ReadModelVersion = "read-model-version";

    /// <summary>SHA-256 of the token for first set-up, in hexadecimal digits.</summary>
    public const string SetUpTokenHash = "set-up-token-sha256";

    /// <summary>Common id of a backup's two halves; stands in copies only.</summary>
    public const string BackupId = "backup-id";

    /// <summary>Name of the value.</summary>
    public required string Name { get; init; }

    /// <summary>The value.</summary>
    public required string Value { get; set; }
}

/// <summary>Table <c>store_facts</c>.</summary>
internal sealed class StoreFactConfiguration : IEntityTypeConfiguration<StoreFactRow>
{
    public void Configure(EntityTypeBuilder<StoreFactRow> builder)
    {
        builder.ToTable("store_facts");
        builder.HasKey(f => f.Name);
        builder.Property(f => f.Name).HasColumnName("name").HasMaxLength(64);
        builder.Property(f => f.Value).HasColumnName("value");
    }
}
