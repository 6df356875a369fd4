using ModelLab.Ledger.Entries;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;

namespace ModelLab.Projects.Views;

/// <summary>Brings a project's read model up to date, entry by entry. The only way in which documents come about.</summary>
public static class ProjectProjection
{
    /// <summary>Takes up one entry; kinds that it does not know change nothing.</summary>
    public static void Apply(LedgerEntry entry, IReadModelWriter model)
    {
        switch (EntryKinds.Read(entry))
        {
            case ProjectOpened e:
                model.Put(new ProjectView(entry.LedgerId, e.Name, e.Question, entry.At, entry.By));
                model.Put(new MemberView(entry.By.PersonId, entry.By.Name, Role.Owner, entry.At));
                break;
            case MemberJoined e:
                model.Put(new MemberView(e.PersonId, e.Name, e.Role, entry.At));
                break;
            case MemberRoleChanged e:
                model.Put(Existing<MemberView>(model, e.PersonId) with { Role = e.Role });
                break;
            case MemberLeft e:
                model.Put(Existing<MemberView>(model, e.PersonId) with { Role = null });
                break;
            case SourceReceived e:
                model.Put(new SourceView(e.SourceId, e.Sha256, e.Bytes, e.Rows, e.Dialect, entry.At, entry.By, entry.Number));
                break;
            case DatasetRead e:
                model.Put(new DatasetView(e.DatasetId, e.SourceId, e.PreviousDatasetId, e.Rows, [.. e.Variables.Select(v => v.Id)], entry.At, entry.Number));
                foreach (var variable in e.Variables)
                {
                    PutVariable(model, e.DatasetId, variable, entry.Number);
                }

                break;
            case VariableDescribed e:
                PutVariable(model, e.DatasetId, e.State, entry.Number);
                break;
            case PreparationMade e:
                model.Put(new PreparationView(e.PreparationId, e.DatasetId, e.BasedOnId, e.DictionaryEntry, e.Steps, entry.At, entry.By, entry.Number));
                break;
            case PathStarted e:
                model.Put(new PathView(e.PathId, e.Name, e.Plan, e.FromRevisionId, e.AgainOfPathId, entry.Reason ?? string.Empty, entry.At, entry.By, null, 0));
                break;
            case RevisionMade e:
                PutRevision(model, e, entry);
                break;
            case CommentMade e:
                model.Put(new CommentView(e.CommentId, e.Place, e.ReplyTo, e.Text, entry.At, entry.By, false, null, null, null));
                break;
            case CommentSettled e:
                model.Put(Existing<CommentView>(model, e.CommentId) with { Settled = true, SettledAt = entry.At, SettledBy = entry.By, SettledReason = entry.Reason });
                break;
            case FindingRaised e:
                model.Put(new FindingView(e.FindingId, e.Finding, FindingState.Open, entry.At, entry.Number, null, null, null, null));
                break;
            case FindingAccepted e:
                PutFinding(model, e.FindingId, FindingState.Accepted, entry);
                break;
            case FindingGone e:
                PutFinding(model, e.FindingId, FindingState.Gone, entry);
                break;
        }
    }

    private static void PutVariable(IReadModelWriter model, string datasetId, VariableState v, long entryNumber) =>
        model.Put(new VariableView(
            datasetId, v.Id, entryNumber, v.Name, v.Label, v.Unit, v.Kind, v.Confirmed, v.Numeric, v.Missing, v.Distinct,
            v.MissingCodes, v.ReferenceCategory, v.Note, v.Questions));

    private static void PutRevision(IReadModelWriter model, RevisionMade e, LedgerEntry entry)
    {
        var fit = e.Figures.Fit;
        model.Put(new RevisionView(
            e.RevisionId, e.PathId, e.Number, entry.Number, entry.Hash, e.Decision, entry.At, entry.By, e.Terms, e.PreparationId,
            fit.N, fit.RSquared, fit.AdjustedRSquared, fit.S, fit.Aic));
        model.Put(Existing<PathView>(model, e.PathId) with { LastRevisionId = e.RevisionId, Revisions = e.Number });
    }

    private static void PutFinding(IReadModelWriter model, string id, FindingState state, LedgerEntry entry) =>
        model.Put(Existing<FindingView>(model, id) with { State = state, ChangedEntry = entry.Number, ChangedAt = entry.At, ChangedBy = entry.By, ChangedReason = entry.Reason });

    private static T Existing<T>(IReadModelWriter model, string id)
        where T : class, IView =>
        model.Find<T>(id) ?? throw new InvalidOperationException($"The ledger speaks of a {ReadModelCollections.Names[typeof(T)]} '{id}' that no earlier entry made.");
}
