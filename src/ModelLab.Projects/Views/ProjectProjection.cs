using ModelLab.Ledger.Entries;
using ModelLab.Projects.Storage;

namespace ModelLab.Projects.Views;

/// <summary>Brings a project's read model up to date, entry by entry. The only way in which documents come about.</summary>
public static class ProjectProjection
{
    /// <summary>Takes up one entry; kinds that it does not know change nothing.</summary>
    public static void Apply(LedgerEntry entry, IReadModelWriter model) => throw new NotImplementedException();
}
