using System.Globalization;
using ModelLab.Store.Sqlite.Upkeep;

namespace ModelLab.Web.Verbs;

/// <summary>Checks everything that is stored against itself.</summary>
public sealed class CheckVerb : IVerb
{
    /// <inheritdoc/>
    public string Name => "check";

    /// <inheritdoc/>
    public string Summary => "Checks the database, every ledger, read model and source, and prints what was found. Ends with 1 if anything is wrong.";

    /// <inheritdoc/>
    public IReadOnlyList<VerbOption> Options { get; } = [];

    /// <inheritdoc/>
    public async Task<int> RunAsync(IReadOnlyDictionary<string, string> options, IServiceProvider services, TextWriter output, CancellationToken cancellation)
    {
        var result = await services.GetRequiredService<StoreCheck>().RunAsync(cancellation);
        foreach (var problem in result.Problems)
        {
            await output.WriteLineAsync(problem);
        }

        await output.WriteLineAsync(string.Create(
            CultureInfo.InvariantCulture,
            $"{(result.Ok ? "Nothing wrong" : $"{result.Problems.Count} wrong")}: {result.Ledgers} ledgers with {result.Entries} entries, {result.Sources} sources ({result.Withdrawn} withdrawn), {result.SealedParts} sealed parts, {result.Contents} contents."));
        return result.Ok ? 0 : 1;
    }
}
