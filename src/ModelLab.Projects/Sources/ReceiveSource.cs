using System.Text.Json;
using System.Text.Json.Nodes;
using ModelLab.Intake;
using ModelLab.Intake.Csv;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Sources;

/// <summary>What comes with a file.</summary>
/// <param name="FileName">Its name, for people.</param>
/// <param name="Options">How it is written, where the person knows.</param>
/// <param name="IdentifiersChecked">The person has looked at the columns that seem to identify people and may store them.</param>
/// <param name="PreviousDatasetId">The dataset that this file corrects, or null.</param>
/// <param name="Reason">Why; needed for a correction.</param>
public sealed record SourceRequest(string? FileName, CsvOptions Options, bool IdentifiersChecked, string? PreviousDatasetId, string? Reason);

/// <summary>A file taken in.</summary>
public sealed record ReceivedSource(SourceView Source, DatasetView Dataset, TableProfile Profile, IReadOnlyList<VariableView> Variables);

/// <summary>Takes in a file: stored as received, read once, proposed as a dataset. A file that is refused leaves nothing behind.</summary>
public sealed class ReceiveSource(ProjectGate gate, IProjectStore store, ISourceVault vault, VariableStates states)
{
    /// <summary>Takes it in.</summary>
    /// <param name="caller">Who.</param>
    /// <param name="projectId">The project.</param>
    /// <param name="request">What comes with the file.</param>
    /// <param name="content">The file, read once from beginning to end.</param>
    /// <param name="cancellation">Stops the work; nothing is stored then.</param>
    /// <param name="completed">Asked after the file was read to its end, where more comes behind it: what it says takes the place of <paramref name="request"/>.</param>
    /// <exception cref="IntakeRefusedException">The file is no text table that can be read; rows and columns are named.</exception>
    /// <exception cref="RefusedException">It seems to hold direct identifiers, or does not match the dataset that it corrects.</exception>
    public async Task<ReceivedSource> ExecuteAsync(
        Caller caller, string projectId, SourceRequest request, Stream content, CancellationToken cancellation,
        Func<CancellationToken, Task<SourceRequest>>? completed = null)
    {
        var admission = await gate.EnterAsync(caller, projectId, Role.Analyst, cancellation);
        var known = completed is null ? await CheckAsync(projectId, request, cancellation) : null;
        var sourceId = gate.NewId();
        var datasetId = gate.NewId();
        TableProfile profile;
        try
        {
            var stored = await vault.StoreAsync(projectId, sourceId, content, cancellation);
            if (completed is not null)
            {
                request = await completed(cancellation);
            }

            known ??= await CheckAsync(projectId, request, cancellation);
            profile = await Task.Run(() => CsvTable.Profile(() => vault.Open(projectId, sourceId), request.Options, cancellation), cancellation);
            if (!request.IdentifiersChecked)
            {
                QuestionIdentifiers(profile);
            }

            var source = new SourceView(sourceId, stored.Sha256, stored.Bytes, profile.Rows, profile.Dialect, default, admission.Author, 0);
            var variables = await StatesAsync(projectId, source, profile, known.Previous, cancellation);
            await gate.RecordAsync(
                admission,
                [
                    new Act(
                        new SourceReceived(sourceId, stored.Sha256, stored.Bytes, profile.Rows, profile.Dialect, CsvTable.MethodVersion),
                        known.Reason, sourceId, new JsonObject { ["fileName"] = known.FileName }),
                    new Act(
                        new DatasetRead(datasetId, sourceId, request.PreviousDatasetId, profile.Rows, variables),
                        known.Reason, sourceId, new JsonObject { ["columns"] = JsonSerializer.SerializeToNode(profile.Columns, ProjectJson.Options) }),
                ],
                null,
                cancellation,
                adopted: [sourceId]);
        }
        catch
        {
            await vault.DiscardAsync(projectId, sourceId, CancellationToken.None);
            throw;
        }

        // From here on the source is the project's: whatever fails now, it stays.
        return await store.ReadAsync(
            projectId,
            m =>
            {
                var dataset = m.Find<DatasetView>(datasetId)!;
                return new ReceivedSource(m.Find<SourceView>(sourceId)!, dataset, profile, DataDictionary.At(m, dataset).Variables);
            },
            cancellation);
    }

    private async Task<Known> CheckAsync(string projectId, SourceRequest request, CancellationToken cancellation) => new(
        Reasons.Name(Path.GetFileName(request.FileName?.Replace('\\', '/')), "fileName"),
        request.PreviousDatasetId is null && string.IsNullOrWhiteSpace(request.Reason) ? null : Reasons.Require(request.Reason),
        request.PreviousDatasetId is null ? null : await PreviousAsync(projectId, request.PreviousDatasetId, cancellation));

    private static void QuestionIdentifiers(TableProfile profile)
    {
        var suspects = profile.DirectIdentifiers.ToList();
        if (suspects.Count > 0)
        {
            throw new RefusedException(
                RefusalKind.Invalid,
                $"{string.Join(", ", suspects.Select(c => c.Name))} seem{(suspects.Count == 1 ? "s" : string.Empty)} to hold direct identifiers of people. Nothing was stored. "
                + "Take the columns out of the file, or send it again with identifiersChecked=true once you have made sure that they may be kept here. Your data protection rules and ethics approval decide.",
                [.. suspects.Select(c => new RefusalDetail(null, c.Name, c.Questions.First(q => q.Code == "direct-identifier").Message))]);
        }
    }

    private async Task<IReadOnlyList<VariableState>> StatesAsync(
        string projectId, SourceView source, TableProfile profile, Previous? previous, CancellationToken cancellation)
    {
        var proposed = profile.Columns.Select((c, i) => VariableStates.Propose($"v{i + 1}", c)).ToList();
        if (previous is null)
        {
            return proposed;
        }

        RequireSameColumns(profile, previous.Dictionary);
        var contents = SourceContents.Of(profile.Columns);
        var carried = new List<VariableState>();
        foreach (var state in proposed)
        {
            carried.Add(await CarriedAsync(projectId, source, contents, state, previous, cancellation));
        }

        return carried;
    }

    /// <summary>
    /// The description of a variable, carried over from the dataset that the file corrects: what people said holds, and the file is
    /// refused where it cannot. What nobody confirmed is proposed anew where it does not fit.
    /// </summary>
    private async Task<VariableState> CarriedAsync(
        string projectId, SourceView source, SourceContents contents, VariableState proposed, Previous previous, CancellationToken cancellation)
    {
        var old = previous.Dictionary.Find(proposed.Name)!;
        var reference = old.ReferenceCategory is { } index && VariableStates.HasCategories(old.Kind) ? previous.Contents.Categories(old.Name)[index] : null;

        // Texts such as NA that the earlier file did not hold are taken as missing as in any new file.
        var codes = old.MissingCodes.Union(proposed.MissingCodes.Except(previous.Contents.Of(old.Name).MissingCodes, StringComparer.Ordinal), StringComparer.Ordinal).ToList();
        var change = new VariableChange(old.Label, old.Unit, old.Kind, codes, reference, old.Note, null);
        var before = proposed with { Id = old.VariableId };
        try
        {
            var after = await states.ApplyAsync(projectId, source, contents, before, change, cancellation);
            return after with { Confirmed = old.Confirmed };
        }
        catch (RefusedException) when (!old.Confirmed)
        {
            return before;
        }
        catch (RefusedException refused)
        {
            throw new RefusedException(
                refused.Kind,
                $"The description of '{old.Name}' does not fit the corrected file. {refused.Message} Correct the file, or change the description in the dataset that it corrects, then send it again. Nothing was stored.",
                refused.Details);
        }
    }

    private static void RequireSameColumns(TableProfile profile, DataDictionary before)
    {
        var now = profile.Columns.Select(c => c.Name).ToHashSet(StringComparer.Ordinal);
        var old = before.Variables.Select(v => v.Name).ToHashSet(StringComparer.Ordinal);
        if (!now.SetEquals(old))
        {
            var missing = old.Except(now).ToList();
            var added = now.Except(old).ToList();
            throw new RefusedException(
                RefusalKind.Invalid,
                "A corrected file has the same columns as the one that it corrects. Nothing was stored. "
                + (missing.Count > 0 ? $"Missing: {string.Join(", ", missing)}. " : string.Empty)
                + (added.Count > 0 ? $"Not there before: {string.Join(", ", added)}. " : string.Empty)
                + "Send it without previousDatasetId to make an unrelated dataset of it.",
                [.. missing.Concat(added).Select(c => new RefusalDetail(0, c, "This column is in one of the two files only."))]);
        }
    }

    private async Task<Previous> PreviousAsync(string projectId, string datasetId, CancellationToken cancellation)
    {
        var dictionary = await store.ReadAsync(
            projectId, m => DataDictionary.At(m, m.Find<DatasetView>(datasetId) ?? throw RefusedException.NotFound("such dataset")), cancellation);
        return new Previous(dictionary, await SourceContents.OpenAsync(vault, projectId, dictionary.Dataset, cancellation));
    }

    private sealed record Known(string FileName, string? Reason, Previous? Previous);

    private sealed record Previous(DataDictionary Dictionary, SourceContents Contents);
}
