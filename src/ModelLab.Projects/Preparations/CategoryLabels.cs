using System.Text.Json;
using System.Text.Json.Nodes;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Preparations;

/// <summary>Names of the categories that collapsing made, by step. They may repeat what stands in the source, so they are kept sealed.</summary>
public sealed class CategoryLabels
{
    private readonly Dictionary<string, IReadOnlyList<string>> byStep;

    private CategoryLabels(Dictionary<string, IReadOnlyList<string>> byStep) => this.byStep = byStep;

    /// <summary>No step collapsed anything.</summary>
    public static CategoryLabels None { get; } = new(new(StringComparer.Ordinal));

    /// <summary>Whether there are none.</summary>
    public bool IsEmpty => byStep.Count == 0;

    /// <summary>Opens the sealed part of a preparation's entry.</summary>
    public static async Task<CategoryLabels> OpenAsync(ISourceVault vault, string projectId, PreparationView? preparation, CancellationToken cancellation)
    {
        var content = preparation is null ? null : await vault.UnsealAsync(projectId, preparation.EntryNumber, cancellation);
        return new CategoryLabels(EntryKinds.ReadSealed<Dictionary<string, IReadOnlyList<string>>>(content, "labels") ?? new(StringComparer.Ordinal));
    }

    /// <summary>The names that a step made, in the order of its groups.</summary>
    public IReadOnlyList<string> Of(string stepId) => byStep[stepId];

    /// <summary>These with those of one more step.</summary>
    public CategoryLabels With(string stepId, IReadOnlyList<string> labels) =>
        new(new Dictionary<string, IReadOnlyList<string>>(byStep, StringComparer.Ordinal) { [stepId] = labels });

    /// <summary>As sealed content.</summary>
    public JsonObject ToContent() => new() { ["labels"] = JsonSerializer.SerializeToNode(byStep, ProjectJson.Options) };
}
