using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Sources;

/// <summary>A source with the name under which it was received.</summary>
public sealed record SourceReading(SourceView Source, string? FileName);

/// <summary>The bytes of a source as they were received.</summary>
/// <param name="Source">The source.</param>
/// <param name="FileName">Its name.</param>
/// <param name="Content">The bytes; the caller closes the stream.</param>
public sealed record SourceContent(SourceView Source, string? FileName, Stream Content);

/// <summary>Lists sources and gives their bytes back, so that an owner can compare them with the file on the own disk.</summary>
public sealed class ReadSources(ProjectGate gate, IProjectStore store, ISourceVault vault)
{
    /// <summary>All sources of a project, oldest first.</summary>
    public async Task<IReadOnlyList<SourceReading>> AllAsync(Caller caller, string projectId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var readings = new List<SourceReading>();
        foreach (var source in await store.ReadAsync(projectId, m => m.All<SourceView>(), cancellation))
        {
            readings.Add(new SourceReading(source, await FileNameAsync(projectId, source, cancellation)));
        }

        return readings;
    }

    /// <summary>One source with its bytes.</summary>
    /// <exception cref="RefusedException">There is none, or it was withdrawn.</exception>
    public async Task<SourceContent> OpenAsync(Caller caller, string projectId, string sourceId, CancellationToken cancellation)
    {
        await gate.EnterAsync(caller, projectId, Role.Reader, cancellation);
        var source = await store.ReadAsync(projectId, m => m.Find<SourceView>(sourceId) ?? throw RefusedException.NotFound("such source"), cancellation);
        return new SourceContent(source, await FileNameAsync(projectId, source, cancellation), vault.Open(projectId, sourceId));
    }

    private async Task<string?> FileNameAsync(string projectId, SourceView source, CancellationToken cancellation)
    {
        try
        {
            return EntryKinds.ReadSealed<string>(await vault.UnsealAsync(projectId, source.EntryNumber, cancellation), "fileName");
        }
        catch (RefusedException refused) when (refused.Kind == RefusalKind.Withdrawn)
        {
            return null; // the name went with the source
        }
    }
}
