using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ModelLab.Ledger;
using ModelLab.Ledger.Entries;

namespace ModelLab.Store.Ledgers;

/// <summary>Where a ledger stands. Its count is a concurrency token: a writer that did not see the last entry fails.</summary>
public sealed class LedgerHeadRow
{
    private const int HashLength = 32;

    /// <summary>Id of the project, or <c>server</c>.</summary>
    public required string LedgerId { get; init; }

    /// <summary>Entries so far.</summary>
    public long Count { get; set; }

    /// <summary>Hash of the last entry.</summary>
    public Sha256Hash LastHash { get; set; }

    /// <summary>Roots of the complete subtrees, largest first, 32 bytes each.</summary>
    public byte[] Frontier { get; set; } = [];

    /// <summary>Rises when the read model was formed anew, so that copies held in memory are dropped.</summary>
    public int Generation { get; set; }

    /// <summary>The head as the ledger knows it.</summary>
    public LedgerHead ToHead() =>
        new(LedgerId, Count, LastHash, [.. Frontier.Chunk(HashLength).Select(bytes => new Sha256Hash(bytes))]);

    /// <summary>Takes up the values of a later head.</summary>
    public void MoveTo(LedgerHead head)
    {
        Count = head.Count;
        LastHash = head.LastHash;
        var frontier = new byte[head.Frontier.Count * HashLength];
        for (var i = 0; i < head.Frontier.Count; i++)
        {
            head.Frontier[i].Bytes.CopyTo(frontier.AsSpan(i * HashLength));
        }

        Frontier = frontier;
    }
}

/// <summary>Table <c>ledger_heads</c>.</summary>
internal sealed class LedgerHeadConfiguration : IEntityTypeConfiguration<LedgerHeadRow>
{
    public void Configure(EntityTypeBuilder<LedgerHeadRow> builder)
    {
        builder.ToTable("ledger_heads");
        builder.HasKey(h => h.LedgerId);
        builder.Property(h => h.LedgerId).HasColumnName("ledger_id").HasMaxLength(64);
        builder.Property(h => h.Count).HasColumnName("count").IsConcurrencyToken();
        builder.Property(h => h.LastHash).HasColumnName("last_hash");
        builder.Property(h => h.Frontier).HasColumnName("frontier");
        builder.Property(h => h.Generation).HasColumnName("generation");
    }
}
