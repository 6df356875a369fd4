using ModelLab.Intake;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Entries;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Statistics.Designs;

namespace ModelLab.Projects.Tests;

/// <summary>What the dictionary says, and what it makes of categories, missing codes, corrected files and odd names.</summary>
public sealed class DictionaryTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task A_reference_category_that_is_declared_missing_gives_way_and_old_paths_keep_it()
    {
        var project = await bench.ProjectAsync();
        var dataset = (await bench.SourceAsync(project, Heated())).Dataset.Id;
        await DescribeAsync(project, dataset, "heat", reference: "oil");
        var before = await StartAsync(project, dataset, "before", "heat");
        await DescribeAsync(project, dataset, "heat", codes: ["oil"]);
        var described = await VariableAsync(project, dataset, "heat");
        Assert.Null(described.Variable.ReferenceCategory);
        Assert.Equal("gas", described.Reference);
        Assert.Equal(["gas", "wood"], described.Categories!.Categories.Select(c => c.Category));
        var after = await StartAsync(project, dataset, "after", "heat");
        Assert.Equal(["oil", "gas"], [before.Terms[0].Reference, after.Terms[0].Reference]);
        Assert.Equal([30, 20], [before.N, after.N]);
        var again = await bench.Get<ReadRevision>().OneAsync(Bench.Analyst, project, before.Id!, Bench.Stop);
        Assert.Equal(before.Coefficients, again.Coefficients);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task A_reference_without_rows_among_those_analysed_is_told_and_the_one_in_force_is_named()
    {
        // Every home with oil is missing in age.
        var project = await bench.ProjectAsync();
        var lines = Heated().TrimEnd('\n').Split('\n');
        var table = string.Join('\n', lines.Select((l, i) => i == 0 ? l + ",gappy" : l + (l.EndsWith("oil", StringComparison.Ordinal) ? "," : $",{i * i % 23}.5"))) + "\n";
        var dataset = (await bench.SourceAsync(project, table)).Dataset.Id;
        await DescribeAsync(project, dataset, "heat", reference: "oil");
        var revision = await StartAsync(project, dataset, "path", "heat", "gappy");
        Assert.Equal("gas", revision.Terms[0].Reference);
        Assert.Equal("wood", Assert.Single(revision.Coefficients, c => c.Term == "heat").Category);
        Assert.Contains(revision.Notices, n => n.Contains("read against gas", StringComparison.Ordinal));
    }

    [Fact]
    public async Task An_empty_reference_clears_it()
    {
        var project = await bench.ProjectAsync();
        var dataset = (await bench.SourceAsync(project, Heated())).Dataset.Id;
        await DescribeAsync(project, dataset, "heat", reference: "wood");
        Assert.Equal("wood", (await VariableAsync(project, dataset, "heat")).Reference);
        await DescribeAsync(project, dataset, "heat", reference: string.Empty);
        Assert.Equal("gas", (await VariableAsync(project, dataset, "heat")).Reference);
    }

    [Fact]
    public async Task Missing_codes_that_go_and_come_back_give_the_same_counts()
    {
        var project = await bench.ProjectAsync();
        var dataset = (await bench.SourceAsync(project, Heated().Replace(",gas\n", ",NA\n", StringComparison.Ordinal))).Dataset.Id;
        var first = (await VariableAsync(project, dataset, "heat")).Variable;
        Assert.Equal(["NA"], first.MissingCodes);
        await DescribeAsync(project, dataset, "heat", kind: VariableKind.Categorical, codes: []);
        var without = (await VariableAsync(project, dataset, "heat")).Variable;
        Assert.Equal([0, 3], [without.Missing, without.Distinct]);
        await DescribeAsync(project, dataset, "heat", codes: ["NA"]);
        var back = (await VariableAsync(project, dataset, "heat")).Variable;
        Assert.Equal([first.Missing, first.Distinct], [back.Missing, back.Distinct]);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task A_variable_of_which_everything_is_declared_missing_cannot_enter()
    {
        var project = await bench.ProjectAsync();
        var dataset = (await bench.SourceAsync(project, Heated())).Dataset.Id;
        await DescribeAsync(project, dataset, "heat", codes: ["gas", "oil", "wood"]);
        var refused = await Assert.ThrowsAsync<RefusedException>(() => StartAsync(project, dataset, "path", "heat"));
        Assert.Contains("no value that is not missing", refused.Message, StringComparison.Ordinal);
        Assert.Null((await VariableAsync(project, dataset, "heat")).Reference);
    }

    [Fact]
    public async Task Spaces_around_codes_do_not_make_other_categories()
    {
        var project = await bench.ProjectAsync();
        var rows = string.Join('\n', Enumerable.Range(1, 30).Select(i => $"{100 + (i * 7 % 13)}.5, {1 + (i % 3)}{(i % 2 == 0 ? " " : string.Empty)}, {(i % 4 == 0 ? "n/k" : i % 4 == 1 ? "yes" : "no")}"));
        var source = await bench.SourceAsync(project, "saved,band_code,loft\n" + rows + "\n");
        var dataset = source.Dataset.Id;
        await DescribeAsync(project, dataset, "band_code", kind: VariableKind.Categorical);
        await DescribeAsync(project, dataset, "loft", kind: VariableKind.Categorical, codes: ["n/k"]);
        var revision = await StartAsync(project, dataset, "path", "band_code", "loft");
        Assert.Equal(["2", "3"], revision.Coefficients.Where(c => c.Term == "band_code").Select(c => c.Category));
        Assert.Single(revision.Coefficients, c => c.Term == "loft");
        Assert.Equal(23, revision.N);
        Assert.Equal(2, (await VariableAsync(project, dataset, "loft")).Categories!.Categories.Count);
    }

    [Theory]
    [InlineData("floor area (m²)")]
    [InlineData("say \"when\"")]
    [InlineData("x^2")]
    [InlineData("intercept")]
    [InlineData("température")]
    [InlineData("床面積")]
    [InlineData("1st")]
    [InlineData("a × b")]
    public async Task Names_of_any_kind_enter_leave_and_come_back(string name)
    {
        var project = await bench.ProjectAsync();
        var quoted = "\"" + name.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
        var table = Heated().Replace("saved,area,", $"saved,{quoted},", StringComparison.Ordinal);
        var dataset = (await bench.SourceAsync(project, table)).Dataset.Id;
        var first = await StartAsync(project, dataset, "path", name, "heat");
        Assert.Equal(new VariableTerm(name).Text, first.Terms[0].Term);
        var without = await bench.DecideAsync(project, first, DecisionKind.Remove, name);
        var back = await bench.DecideAsync(project, without, DecisionKind.Add, name);
        Assert.Equal(first.Coefficients, back.Coefficients);
        Assert.True((await bench.Get<ReplayProject>().ExecuteAsync(Bench.Analyst, project, Bench.Stop)).Ok);
    }

    [Fact]
    public async Task A_corrected_file_may_hold_missing_texts_that_the_first_did_not()
    {
        var project = await bench.ProjectAsync();
        var first = await bench.SourceAsync(project, Heated());
        await DescribeAsync(project, first.Dataset.Id, "area", kind: VariableKind.Continuous);
        var corrected = await bench.SourceAsync(project, Heated().Replace(",5.25,", ",NA,", StringComparison.Ordinal), previousDatasetId: first.Dataset.Id);
        var area = corrected.Variables.Single(v => v.Name == "area");
        Assert.Equal(["NA"], area.MissingCodes);
        Assert.True(area.Missing > 0 && area.Confirmed && area.Numeric);
    }

    [Fact]
    public async Task What_nobody_confirmed_is_proposed_anew_where_a_corrected_file_differs_and_what_was_confirmed_is_refused()
    {
        var project = await bench.ProjectAsync();
        var two = Heated().Replace(",wood\n", ",gas\n", StringComparison.Ordinal);
        var first = await bench.SourceAsync(project, two);
        Assert.Equal(VariableKind.Binary, first.Variables.Single(v => v.Name == "heat").Kind);
        var corrected = await bench.SourceAsync(project, Heated(), previousDatasetId: first.Dataset.Id);
        Assert.Equal(VariableKind.Categorical, corrected.Variables.Single(v => v.Name == "heat").Kind);
        Assert.Equal(first.Variables.Select(v => v.VariableId), corrected.Variables.Select(v => v.VariableId));

        await DescribeAsync(project, first.Dataset.Id, "heat", kind: VariableKind.Binary);
        var held = bench.Store.SourcesHeld;
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.SourceAsync(project, Heated(), previousDatasetId: first.Dataset.Id));
        Assert.Contains("'heat' does not fit the corrected file", refused.Message, StringComparison.Ordinal);
        Assert.Equal(held, bench.Store.SourcesHeld);
    }

    [Fact]
    public async Task A_variable_that_is_no_category_any_more_has_no_reference_and_its_file_can_be_corrected()
    {
        var project = await bench.ProjectAsync();
        var coded = Heated().Replace(",gas\n", ",1\n", StringComparison.Ordinal).Replace(",oil\n", ",2\n", StringComparison.Ordinal).Replace(",wood\n", ",3\n", StringComparison.Ordinal);
        var first = await bench.SourceAsync(project, coded);
        await DescribeAsync(project, first.Dataset.Id, "heat", kind: VariableKind.Categorical, reference: "2");
        await DescribeAsync(project, first.Dataset.Id, "heat", kind: VariableKind.Continuous);
        Assert.Null((await VariableAsync(project, first.Dataset.Id, "heat")).Variable.ReferenceCategory);
        var corrected = await bench.SourceAsync(project, coded.Replace(",5.25,", ",6.25,", StringComparison.Ordinal), previousDatasetId: first.Dataset.Id);
        Assert.Equal(VariableKind.Continuous, corrected.Variables.Single(v => v.Name == "heat").Kind);
    }

    [Fact]
    public async Task A_source_that_was_taken_up_is_not_discarded_when_the_answer_fails()
    {
        var project = await bench.ProjectAsync();
        using var stop = new CancellationTokenSource();
        bench.Store.AfterCommit = stop.Cancel;
        await Record.ExceptionAsync(() => bench.Get<ReceiveSource>().ExecuteAsync(
            Bench.Analyst, project, new SourceRequest("data.csv", new(), false, null, "the register"), new MemoryStream(System.Text.Encoding.UTF8.GetBytes(Heated())), stop.Token));
        Assert.True(stop.IsCancellationRequested);
        Assert.Empty(bench.Store.Discarded);
        Assert.Equal(1, bench.Store.SourcesHeld);
    }

    [Fact]
    public async Task The_reason_that_comes_with_a_first_file_is_kept()
    {
        var project = await bench.ProjectAsync();
        await bench.SourceAsync(project, Heated());
        var entry = bench.Store.Entries(project).Select(b => Ledger.Entries.LedgerEntry.Parse(b)).Single(e => e.Kind == "source-received/1");
        Assert.Equal("the file of the study", entry.Reason);
    }

    private static string Heated() => "saved,area,heat\n" + string.Join('\n', Enumerable.Range(1, 30).Select(i =>
        $"{100 + (i * 7 % 13)}.5,{i * 5 % 11}.25,{(i % 3) switch { 0 => "gas", 1 => "oil", _ => "wood" }}")) + "\n";

    private async Task<RevisionReading> StartAsync(string project, string dataset, string name, params string[] terms) =>
        (await bench.PathAsync(project, Bench.Start(dataset, "saved", terms) with { Name = name })).Revisions[0];

    private async Task<VariableReading> VariableAsync(string project, string dataset, string name) =>
        (await bench.Get<ReadDataset>().ExecuteAsync(Bench.Analyst, project, dataset, Bench.Stop)).Variables.Single(v => v.Variable.Name == name);

    private Task DescribeAsync(
        string project, string dataset, string variable, VariableKind? kind = null, IReadOnlyList<string>? codes = null, string? reference = null) =>
        bench.Get<DescribeVariable>().ExecuteAsync(Bench.Analyst, project, dataset, variable, new VariableChange(null, null, kind, codes, reference, null, "as the code list says"), Bench.Stop);
}
