using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace ModelLab.Store.Documents;

/// <summary>A document of a project's read model. It can be formed again from the ledger.</summary>
public sealed class DocumentRow
{
    /// <summary>Id of the project.</summary>
    public required string LedgerId { get; init; }

    /// <summary>Name of the collection.</summary>
    public required string Collection { get; init; }

    /// <summary>Id within project and collection.</summary>
    public required string Id { get; init; }

    /// <summary>Place in its collection, from 0, in the order in which documents were first put.</summary>
    public required int Position { get; set; }

    /// <summary>The document.</summary>
    public required string Json { get; set; }
}

/// <summary>Table <c>documents</c>, indexed across projects for a person's memberships.</summary>
internal sealed class DocumentConfiguration : IEntityTypeConfiguration<DocumentRow>
{
    public void Configure(EntityTypeBuilder<DocumentRow> builder)
    {
        builder.ToTable("documents");
        builder.HasKey(d => new { d.LedgerId, d.Collection, d.Id });
        builder.Property(d => d.LedgerId).HasColumnName("ledger_id").HasMaxLength(64);
        builder.Property(d => d.Collection).HasColumnName("collection").HasMaxLength(32);
        builder.Property(d => d.Id).HasColumnName("id").HasMaxLength(400);
        builder.Property(d => d.Position).HasColumnName("position");
        builder.Property(d => d.Json).HasColumnName("json");
        builder.HasIndex(d => new { d.Collection, d.Id }).HasDatabaseName("documents_by_id");
        builder.HasIndex(d => new { d.LedgerId, d.Collection, d.Position }).HasDatabaseName("documents_in_order");
    }
}
