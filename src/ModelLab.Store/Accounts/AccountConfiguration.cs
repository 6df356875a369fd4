using Microsoft.AspNetCore.Identity;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace ModelLab.Store.Accounts;

/// <summary>Table <c>accounts</c>, with an address only once.</summary>
internal sealed class AccountConfiguration : IEntityTypeConfiguration<Account>
{
    public void Configure(EntityTypeBuilder<Account> builder)
    {
        builder.ToTable("accounts");
        builder.Property(a => a.Name).HasMaxLength(200);
        builder.HasIndex(a => a.NormalizedEmail).IsUnique().HasDatabaseName("accounts_by_email");
        builder.HasIndex(a => a.NormalizedUserName).IsUnique().HasDatabaseName("accounts_by_user_name");
    }
}

/// <summary>Table <c>account_claims</c>.</summary>
internal sealed class AccountClaimConfiguration : IEntityTypeConfiguration<IdentityUserClaim<string>>
{
    public void Configure(EntityTypeBuilder<IdentityUserClaim<string>> builder) => builder.ToTable("account_claims");
}

/// <summary>Table <c>account_logins</c>.</summary>
internal sealed class AccountLoginConfiguration : IEntityTypeConfiguration<IdentityUserLogin<string>>
{
    public void Configure(EntityTypeBuilder<IdentityUserLogin<string>> builder) => builder.ToTable("account_logins");
}

/// <summary>Table <c>account_tokens</c>: what sign-in itself keeps, such as recovery codes.</summary>
internal sealed class AccountTokenConfiguration : IEntityTypeConfiguration<IdentityUserToken<string>>
{
    public void Configure(EntityTypeBuilder<IdentityUserToken<string>> builder) => builder.ToTable("account_tokens");
}
