using System.Security.Cryptography;
using ModelLab.Intake.Csv;
using ModelLab.Ledger;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Replaying;

/// <summary>Reads sources and datasets again.</summary>
internal sealed class DatasetReplay(string projectId, RecordedProject record, ISourceVault vault, VariableStates states)
{
    // Asked only where nobody stated the decimal mark; the dialect on record states it.
    private const string AskedOfGuesses = "thousands-or-decimals";

    /// <summary>Compares the bytes of a source with their recorded hash and number.</summary>
    public async Task<ReplayedSource> SourceAsync(SourceReceived recorded, CancellationToken cancellation)
    {
        try
        {
            await using var stream = vault.Open(projectId, recorded.SourceId);
            using var sha = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
            var buffer = new byte[1 << 16];
            long bytes = 0;
            for (int read; (read = await stream.ReadAsync(buffer, cancellation)) > 0;)
            {
                sha.AppendData(buffer, 0, read);
                bytes += read;
            }

            var equal = new Sha256Hash(sha.GetHashAndReset()) == recorded.Sha256 && bytes == recorded.Bytes;
            return new ReplayedSource(recorded.SourceId, equal, equal ? null : "Its bytes are not those that were received.");
        }
        catch (Exception e) when (Unreadable.Is(e))
        {
            return new ReplayedSource(recorded.SourceId, false, Unreadable.Problem(e));
        }
    }

    /// <summary>Reads a dataset again and counts every state of its dictionary.</summary>
    public async Task<ReplayedDataset> DatasetAsync(DatasetRead recorded, CancellationToken cancellation)
    {
        var problems = new List<string>();
        try
        {
            await CompareAsync(recorded, problems, cancellation);
        }
        catch (Exception e) when (Unreadable.Is(e))
        {
            problems.Add(Unreadable.Problem(e));
        }

        return new ReplayedDataset(recorded.DatasetId, problems.Count == 0, problems);
    }

    private async Task CompareAsync(DatasetRead recorded, List<string> problems, CancellationToken cancellation)
    {
        var received = record.All<SourceReceived>().Single(s => s.SourceId == recorded.SourceId);
        var source = record.Model.Find<SourceView>(recorded.SourceId)!;
        var contents = await SourceContents.OpenAsync(vault, projectId, record.Model.Find<DatasetView>(recorded.DatasetId)!, cancellation);
        if (received.Method == CsvTable.MethodVersion)
        {
            var options = new CsvOptions(source.Dialect.Delimiter, source.Dialect.DecimalMark, source.Dialect.Encoding);
            var profile = await Task.Run(() => CsvTable.Profile(() => vault.Open(projectId, source.Id), options, cancellation), cancellation);
            CompareProfile(recorded, received, profile, contents, problems);
        }

        var described = record.All<VariableDescribed>().Where(d => d.DatasetId == recorded.DatasetId).Select(d => d.State);
        foreach (var state in recorded.Variables.Concat(described))
        {
            if (await states.CountedAsync(projectId, source, contents, state, cancellation) != state)
            {
                problems.Add($"The counts recorded of '{state.Name}' are not those of the source.");
            }
        }
    }

    private static void CompareProfile(
        DatasetRead recorded, SourceReceived received, TableProfile profile, SourceContents contents, List<string> problems)
    {
        if (profile.Rows != recorded.Rows || profile.Rows != received.Rows)
        {
            problems.Add($"The source has {profile.Rows} rows, not the {recorded.Rows} recorded.");
        }

        if (profile.Dialect != received.Dialect)
        {
            problems.Add("The source is not written as recorded.");
        }

        if (!profile.Columns.Select(c => c.Name).SequenceEqual(recorded.Variables.Select(v => v.Name), StringComparer.Ordinal))
        {
            problems.Add("The columns of the source are not the variables recorded.");
            return;
        }

        foreach (var (column, variable) in profile.Columns.Zip(recorded.Variables))
        {
            var sealedColumn = contents.Find(column.Name);
            if (sealedColumn is null || FigureComparison.LargestRelativeDifference(Settled(sealedColumn), Settled(column)) != 0)
            {
                problems.Add($"What was seen of '{column.Name}' is not what is seen now.");
            }

            // A corrected file takes over what people had said of the earlier one; a first reading is the program's alone.
            if (recorded.PreviousDatasetId is null && sealedColumn is not null
                && FigureComparison.LargestRelativeDifference(variable, VariableStates.Propose(variable.Id, sealedColumn)) != 0)
            {
                problems.Add($"What was proposed for '{column.Name}' is not what is proposed now.");
            }
        }
    }

    private static ColumnProfile Settled(ColumnProfile column) => column with { Questions = [.. column.Questions.Where(q => q.Code != AskedOfGuesses)] };
}
