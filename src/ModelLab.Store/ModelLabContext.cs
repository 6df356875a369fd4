using Microsoft.AspNetCore.Identity.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger;
using ModelLab.Store.Accounts;
using ModelLab.Store.Documents;
using ModelLab.Store.Ledgers;
using ModelLab.Store.Model;
using ModelLab.Store.Requests;
using ModelLab.Store.Server;
using ModelLab.Store.Vault;

namespace ModelLab.Store;

/// <summary>
/// The tables of the store. A context lives for one operation; the provider (connection, pragmas, triggers,
/// migrations) is the affair of an assembly of its own.
/// </summary>
public sealed class ModelLabContext(DbContextOptions<ModelLabContext> options) : IdentityUserContext<Account>(options)
{
    /// <summary>Entries of all ledgers.</summary>
    public DbSet<LedgerEntryRow> Entries => Set<LedgerEntryRow>();

    /// <summary>Where each ledger stands.</summary>
    public DbSet<LedgerHeadRow> Heads => Set<LedgerHeadRow>();

    /// <summary>Encrypted parts of entries.</summary>
    public DbSet<SealedPartRow> SealedParts => Set<SealedPartRow>();

    /// <summary>Documents of the read models.</summary>
    public DbSet<DocumentRow> Documents => Set<DocumentRow>();

    /// <summary>Sources in the vault.</summary>
    public DbSet<SourceRow> Sources => Set<SourceRow>();

    /// <summary>Their chunks.</summary>
    public DbSet<SourceChunkRow> SourceChunks => Set<SourceChunkRow>();

    /// <summary>Content addressed by its hash.</summary>
    public DbSet<KeptContentRow> KeptContents => Set<KeptContentRow>();

    /// <summary>API tokens.</summary>
    public DbSet<ApiTokenRow> ApiTokens => Set<ApiTokenRow>();

    /// <summary>Open invitations.</summary>
    public DbSet<InvitationRow> Invitations => Set<InvitationRow>();

    /// <summary>Requests that came with an idempotency key.</summary>
    public DbSet<IdempotencyRow> IdempotencyRecords => Set<IdempotencyRow>();

    /// <summary>Single values of the store.</summary>
    public DbSet<StoreFactRow> Facts => Set<StoreFactRow>();

    /// <inheritdoc/>
    protected override void ConfigureConventions(ModelConfigurationBuilder configurationBuilder)
    {
        base.ConfigureConventions(configurationBuilder);
        configurationBuilder.Properties<DateTimeOffset>().HaveConversion<UtcMicroseconds>();
        configurationBuilder.Properties<Sha256Hash>().HaveConversion<HashBytes>();
    }

    /// <inheritdoc/>
    protected override void OnModelCreating(ModelBuilder builder)
    {
        base.OnModelCreating(builder);
        builder.ApplyConfigurationsFromAssembly(typeof(ModelLabContext).Assembly);

        // Nothing disappears because something else did: the accounts' own tables cascade by default.
        foreach (var foreignKey in builder.Model.GetEntityTypes().SelectMany(e => e.GetForeignKeys()))
        {
            foreignKey.DeleteBehavior = DeleteBehavior.Restrict;
        }
    }
}
