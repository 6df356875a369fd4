using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Store.Accounts;

namespace ModelLab.Store.Server;

/// <summary>A person's invitation to set a password; a later one takes the place of an earlier one.</summary>
public sealed class InvitationRow
{
    /// <summary>Who is invited.</summary>
    public required string PersonId { get; init; }

    /// <summary>SHA-256 of the secret.</summary>
    public required byte[] SecretHash { get; set; }

    /// <summary>From when on it is refused.</summary>
    public required DateTimeOffset ExpiresAt { get; set; }
}

/// <summary>Table <c>invitations</c>.</summary>
internal sealed class InvitationConfiguration : IEntityTypeConfiguration<InvitationRow>
{
    public void Configure(EntityTypeBuilder<InvitationRow> builder)
    {
        builder.ToTable("invitations");
        builder.HasKey(i => i.PersonId);
        builder.Property(i => i.PersonId).HasColumnName("person_id").HasMaxLength(64);
        builder.Property(i => i.SecretHash).HasColumnName("secret_hash");
        builder.Property(i => i.ExpiresAt).HasColumnName("expires_at");
        builder.HasIndex(i => i.SecretHash).IsUnique().HasDatabaseName("invitations_by_secret");
        builder.HasOne<Account>().WithOne().HasForeignKey<InvitationRow>(i => i.PersonId).OnDelete(DeleteBehavior.Restrict);
    }
}
