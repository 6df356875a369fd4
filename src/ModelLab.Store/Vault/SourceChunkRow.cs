using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace ModelLab.Store.Vault;

/// <summary>One chunk of a source, compressed and encrypted.</summary>
public sealed class SourceChunkRow
{
    /// <summary>Id of the project.</summary>
    public required string ProjectId { get; init; }

    /// <summary>Id of the source.</summary>
    public required string SourceId { get; init; }

    /// <summary>Place in the source, from 0.</summary>
    public required int Index { get; init; }

    /// <summary>The ciphertext, the tag at the end.</summary>
    public required byte[] Ciphertext { get; init; }
}

/// <summary>Table <c>source_chunks</c>.</summary>
internal sealed class SourceChunkConfiguration : IEntityTypeConfiguration<SourceChunkRow>
{
    public void Configure(EntityTypeBuilder<SourceChunkRow> builder)
    {
        builder.ToTable("source_chunks");
        builder.HasKey(c => new { c.ProjectId, c.SourceId, c.Index });
        builder.Property(c => c.ProjectId).HasColumnName("project_id").HasMaxLength(64);
        builder.Property(c => c.SourceId).HasColumnName("source_id").HasMaxLength(64);
        builder.Property(c => c.Index).HasColumnName("chunk").ValueGeneratedNever();
        builder.Property(c => c.Ciphertext).HasColumnName("ciphertext");
        builder.HasOne<SourceRow>().WithMany().HasForeignKey(c => new { c.ProjectId, c.SourceId }).OnDelete(DeleteBehavior.Restrict);
    }
}
