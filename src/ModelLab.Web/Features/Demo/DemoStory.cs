using ModelLab.Projects.Entries;
using ModelLab.Projects.Paths;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Views;
using ModelLab.Statistics.Designs;
using ModelLab.Statistics.Selection;

namespace ModelLab.Web.Features.Demo;

/// <summary>
/// What happens in the demo project, step by step. The figures in the texts are those of the shipped tables; a test reads them
/// back from the revisions.
/// </summary>
/// <param name="analyst">The analyst at work.</param>
/// <param name="supervisor">The supervisor at work.</param>
/// <param name="evaluator">The evaluator at work.</param>
/// <param name="projectId">The project.</param>
public sealed class DemoStory(DemoActor analyst, DemoActor supervisor, DemoActor evaluator, string projectId)
{
    private static readonly IReadOnlyList<Term> Candidates = Variables(
        "measure", "floor_area_m2", "rooms", "heating", "tenure_code", "baseline_mwh", "site_degree_days", "occupants",
        "heated_hours", "dwelling_age", "draught_proofed", "distance_km");

    private static readonly IReadOnlyList<Term> HeldIn = Variables("measure", "floor_area_m2", "baseline_mwh", "site_degree_days");

    /// <summary>Plays it from the upload to the questions that are still open.</summary>
    public async Task PlayAsync(CancellationToken cancellation)
    {
        await supervisor.RemarkAsync(
            new Place("project", projectId, null),
            "Plan, agreed before anybody had seen the data. Primary term: measure. Held in: measure, floor area, baseline and degree days. "
            + "The setpoint change stays out, because it comes after the grant. The rest is judged backward by AIC, one term at a time. "
            + "Rows are left out for recording errors only, and only against the paper form.",
            cancellation);
        var delivered = await DescribeDeliveredAsync(cancellation);
        var first = await FirstPathAsync(delivered, cancellation);
        var second = await CorrectedPathAsync(delivered, first, cancellation);
        await OpenQuestionsAsync(delivered, second, cancellation);
    }

    private async Task<DatasetView> DescribeDeliveredAsync(CancellationToken cancellation)
    {
        var dataset = await analyst.UploadAsync(DemoTables.AsDelivered, null, null, cancellation);
        foreach (var description in DemoDictionary.AtFirst)
        {
            await analyst.DescribeAsync(dataset, description.Variable, description.Change, cancellation);
        }

        return dataset;
    }

    // The full model on the register as delivered: rooms seem to matter and the floor area does not.
    private async Task<PathReading> FirstPathAsync(DatasetView dataset, CancellationToken cancellation)
    {
        var path = await analyst.StartAsync(
            new StartRequest(
                "A: register as delivered", dataset.Id, null, "saved_kwh", Candidates, null, HeldIn, new RuleRecord(ChoosingDirection.Backward, Criterion.Aic, null),
                null, null, null, null, "The full model of the plan, as a first look."),
            cancellation);
        var full = path.Revisions[0];
        var question = await supervisor.RemarkAsync(
            At(full, "floor_area_m2"),
            "This cannot be right. A square metre is worth 0.9 kWh with an interval around zero, and a room 112 kWh. Row 8 says 940 m² in five rooms; "
            + "its leverage is 0.90, so that it sets the slope of the floor area all by itself. What does the paper form say?",
            cancellation);
        await analyst.ReplyAsync(
            question,
            "I have looked up the form of MV0008. It says 94.0 m²: the decimal point was lost when it was typed in. The grants office has corrected the register and sent it again. "
            + "No other floor area is out of keeping with its number of rooms.",
            cancellation);
        await analyst.AcceptAsync(
            full, "coded-category",
            "Right: tenure is a category. The code list has come, the description is changed, and the next path uses it. This path stays as it was run.", cancellation);
        await analyst.DescribeAsync(dataset, "tenure_code", DemoDictionary.TenureAsCategory, cancellation);
        await supervisor.SettleAsync(question, "The form confirms 94.0 m². The analysis starts again from the corrected register; this path stays on record.", cancellation);
        return path;
    }

    private async Task<CorrectedPath> CorrectedPathAsync(DatasetView delivered, PathReading first, CancellationToken cancellation)
    {
        var corrected = await analyst.UploadAsync(
            DemoTables.Corrected, delivered.Id, "Floor area of MV0008 corrected from 940 to 94.0 m² by the grants office, against the paper form. Nothing else differs.", cancellation);
        var path = await analyst.RunAgainAsync(
            first, new AgainRequest("B: corrected register", corrected.Id, "The same plan on the corrected register, with tenure as a category."), cancellation);
        var full = path.Revisions[0];
        var tied = await supervisor.RemarkAsync(
            new Place("revision", full.Id!, null),
            "One cell, and the picture turns round: a square metre is worth 9 kWh, and rooms say nothing. The typing error had also hidden that floor area and rooms go together (r .55 before, .87 now). "
            + "Which of the two answers our question?",
            cancellation);
        await analyst.ReplyAsync(tied, "The floor area: the grant is paid by the square metre, and the plan holds it in. Rooms only stand in for it.", cancellation);
        var withoutRooms = await analyst.RemoveAsync(
            full, "rooms",
            "Beside the floor area the number of rooms adds nothing: 7 kWh a room, between −75 and 88. The two carry the same information, and the plan holds the floor area in.", cancellation);
        await supervisor.SettleAsync(tied, "Agreed: floor area stays, rooms leaves.", cancellation);
        var withoutDistance = await analyst.RemoveAsync(
            withoutRooms, "distance_km",
            "There was never a good reason why the distance to the depot should change what insulation saves; it was recorded for travel costs. −4 kWh a kilometre, between −9 and 2, and AIC falls without it.", cancellation);
        return new CorrectedPath(corrected, full, withoutDistance);
    }

    // What a newcomer finds unsettled.
    private async Task OpenQuestionsAsync(DatasetView delivered, CorrectedPath path, CancellationToken cancellation)
    {
        await AgeAsync(path, cancellation);
        await SetpointAsync(path, cancellation);
        await evaluator.RemarkAsync(
            new Place("revision", path.Reduced.Id!, null),
            "Row 412 (MV0412: 205 m², solid wall, oil, 38 MWh) saved 2,850 kWh more than the model expects and stands far out among the residuals. Is it a recording error, a home outside the population, "
            + "or simply a large farmhouse? The plan leaves rows out for recording errors only.",
            cancellation);
        await evaluator.RemarkAsync(
            new Place("variable", delivered.Id, Variable(delivered, "occupants")),
            "37 homes are lost because occupants are missing: one in six of the private tenants, one in thirty of the owners. They saved about 700 kWh less than the others. "
            + "The complete rows are then not a fair sample; should the report not say so, and compare with imputed values later?",
            cancellation);
        await evaluator.RemarkAsync(
            new Place("term", path.Reduced.Id!, "baseline_mwh"),
            "The saving is last winter's use less this winter's, and last winter's use is also a predictor. Part of its slope comes from that alone. I would not read it as an effect.",
            cancellation);
        await supervisor.RemarkAsync(
            new Place("project", projectId, null),
            "For the report: every home in the register had a grant. We can compare measures with one another, and even that only as far as homes with different measures are alike otherwise. "
            + "We cannot say what would have been saved without a grant.",
            cancellation);
    }

    private async Task AgeAsync(CorrectedPath path, CancellationToken cancellation)
    {
        var age = await analyst.RemarkAsync(
            At(path.Reduced, "dwelling_age"),
            "Dwelling age is on the edge: 2.0 kWh a year, between −0.1 and 4.2, p .066. By p at .05 it would leave; by AIC, which the plan names, it just stays. A side path shows the model without it.",
            cancellation);
        var without = await analyst.StartAsync(
            SidePath("B1: without dwelling age", path.Reduced, "To see what depends on dwelling age.", null), cancellation);
        await analyst.RemoveAsync(without.Revisions[0], "dwelling_age", "A trial, to compare: by p at .05 it would leave.", cancellation);
        await supervisor.ReplyAsync(
            age,
            "I would keep it, whatever its p. Older homes used more before the grant, so age is a confounder of the baseline: on the side path the slope of the baseline moves from 102 to 108 kWh a MWh. "
            + "The measures hardly move. Let us decide before we write.",
            cancellation);
    }

    private async Task SetpointAsync(CorrectedPath path, CancellationToken cancellation)
    {
        var with = await analyst.StartAsync(
            SidePath(
                "B2: with the setpoint change", path.Full, "A departure from the plan, to argue about: the fit improves a good deal when the setpoint change is in.",
                [.. Candidates, new VariableTerm("setpoint_change_c")]),
            cancellation);
        var setpoint = await evaluator.RemarkAsync(
            At(with.Revisions[0], "setpoint_change_c"),
            "R² rises from .69 to .77 on the same homes, but at a price. People turn the heating up because the house is better insulated; holding the setpoint still takes that away from the measure. Solid wall gains about 1,870 kWh "
            + "with the setpoint held and about 1,610 without. Which of the two does the council ask about?",
            cancellation);
        await analyst.ReplyAsync(setpoint, "The question says what was saved, so the total. I keep this path for the discussion in the report, not for its conclusions.", cancellation);
    }

    private static StartRequest SidePath(string name, RevisionReading from, string reason, IReadOnlyList<Term>? terms) =>
        new(name, null, null, null, terms, null, null, null, null, null, from.Id, null, reason);

    private static Place At(RevisionReading revision, string term) => new("term", revision.Id!, term);

    private static IReadOnlyList<Term> Variables(params IEnumerable<string> names) => [.. names.Select(n => new VariableTerm(n))];

    // Ids follow the order of the columns.
    private static string Variable(DatasetView dataset, string name) =>
        dataset.VariableIds[DemoDictionary.AtFirst.Select(d => d.Variable).ToList().IndexOf(name)];

    private sealed record CorrectedPath(DatasetView Dataset, RevisionReading Full, RevisionReading Reduced);
}
