using ModelLab.Projects.Comments;
using ModelLab.Projects.Findings;
using ModelLab.Projects.People;
using ModelLab.Projects.Records;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Storage;
using ModelLab.Projects.Views;
using ModelLab.Web.Features.Demo;
using ModelLab.Web.Features.Demo.Data;
using Xunit;

namespace ModelLab.Web.Tests.Features.Demo;

public sealed class DemoLoaderTests(LoadedDemo demo) : IClassFixture<LoadedDemo>
{
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task Three_people_have_their_roles()
    {
        var members = await demo.Use<IProjectStore>().ReadAsync(demo.Project.Id, m => m.All<MemberView>(), Cancellation);
        Assert.Equal([Role.Owner, Role.Analyst, Role.Reviewer], members.Select(m => m.Role));
        foreach (var email in new[] { DemoPeople.AnalystEmail, DemoPeople.SupervisorEmail, DemoPeople.EvaluatorEmail })
        {
            Assert.True((await demo.Use<IPeople>().FindByEmailAsync(email, Cancellation))!.Active);
        }
    }

    [Fact]
    public void Path_A_believes_in_rooms_and_not_in_the_floor_area()
    {
        var full = Assert.Single(demo.Path("A").Revisions);
        Assert.Equal(563, full.N);
        Assert.Equal(0.95, Coefficient(full, "floor_area_m2").Estimate, 0.005);
        Assert.True(Coefficient(full, "floor_area_m2").Lower < 0);
        Assert.Equal(111.96, Coefficient(full, "rooms").Estimate, 0.005);
        Assert.True(Coefficient(full, "rooms").P < 0.001);
        Assert.Equal(1, full.Terms.Single(t => t.Term == "tenure_code").Df);
        var coded = Assert.Single(full.Findings);
        Assert.Equal(("coded-category", FindingState.Accepted), (coded.Finding.Rule, coded.State));
    }

    [Fact]
    public void Path_B_turns_it_round_and_lets_rooms_and_distance_go()
    {
        var path = demo.Path("B");
        Assert.Equal(demo.Path("A").Path.Id, path.Path.AgainOfPathId);
        Assert.Equal([null, "rooms", "distance_km"], path.Revisions.Select(r => r.Decision.Term));
        var full = path.Revisions[0];
        Assert.Equal(3, full.Terms.Single(t => t.Term == "tenure_code").Df);
        Assert.Equal(0.8709983417, Coefficient(full, "rooms").P!.Value, 1e-8);
        Assert.Equal((6.72, -74.54, 87.98), (Round(Coefficient(full, "rooms").Estimate), Round(Coefficient(full, "rooms").Lower), Round(Coefficient(full, "rooms").Upper)));
        var withoutRooms = path.Revisions[1];
        Assert.Equal((-3.66, -9.3, 1.98), (Round(Coefficient(withoutRooms, "distance_km").Estimate), Round(Coefficient(withoutRooms, "distance_km").Lower), Round(Coefficient(withoutRooms, "distance_km").Upper)));
        Assert.True(path.Revisions[2].Fit.Aic < withoutRooms.Fit.Aic);
        var age = Coefficient(path.Revisions[2], "dwelling_age");
        Assert.Equal((2.03, -0.14, 4.2), (Round(age.Estimate), Round(age.Lower), Round(age.Upper)));
        Assert.Equal(0.066, age.P!.Value, 0.0005);
    }

    [Fact]
    public void The_side_paths_show_what_the_remarks_say()
    {
        var withAge = demo.Path("B").Revisions[2];
        var withoutAge = demo.Path("B1").Revisions[^1];
        Assert.Equal((102.0, 107.73), (Round(Coefficient(withAge, "baseline_mwh").Estimate), Round(Coefficient(withoutAge, "baseline_mwh").Estimate)));

        var withSetpoint = Assert.Single(demo.Path("B2").Revisions);
        Assert.Equal(542, withSetpoint.N);
        Assert.Equal(0.774, withSetpoint.Fit.RSquared, 0.0005);
        Assert.Equal(0.774 - 0.686, withSetpoint.Losses.Single(l => l.Term == "setpoint_change_c").RSquaredLoss, 0.001);
        Assert.Equal(1871, withSetpoint.Coefficients.Single(c => c.Term == "measure" && c.Category == "solid wall").Estimate, 1.0);
    }

    [Fact]
    public async Task Tied_predictors_are_gone_on_path_B_and_open_where_rooms_stayed()
    {
        var findings = await demo.Use<ManageFindings>().AllAsync(demo.Caller, demo.Project.Id, Cancellation);
        var tied = findings.Where(f => f.Finding.Rule == "tied-predictors").ToDictionary(f => f.Finding.Place.Id);
        Assert.Equal(FindingState.Gone, tied[demo.Path("B").Revisions[0].Id!].State);
        Assert.Equal(FindingState.Open, tied[demo.Path("B2").Revisions[0].Id!].State);
        Assert.All(tied.Values, f => Assert.Equal(["floor_area_m2", "rooms"], f.Finding.Subject));
    }

    [Fact]
    public async Task Some_remarks_are_settled_and_some_wait_for_a_newcomer()
    {
        var comments = (await demo.Use<ManageComments>().AllAsync(demo.Caller, demo.Project.Id, Cancellation)).Where(c => c.ReplyTo is null).ToList();
        Assert.Equal(2, comments.Count(c => c.Settled));
        var age = Assert.Single(comments, c => c.Place.Part == "dwelling_age");
        Assert.False(age.Settled);
        var missing = Assert.Single(comments, c => c.Place.Kind == "variable");
        Assert.Equal("v" + (1 + Array.IndexOf(GrantsTable.Header.Split(','), "occupants")), missing.Place.Part);
    }

    [Fact]
    public async Task The_ledger_verifies_and_everything_replays()
    {
        var verified = await demo.Use<ReadLedger>().VerifyAsync(demo.Caller, demo.Project.Id, Cancellation);
        Assert.True(verified.Ok, verified.ToString());
        var replayed = await demo.Use<ReplayProject>().ExecuteAsync(demo.Caller, demo.Project.Id, Cancellation);
        Assert.True(replayed.Ok);
        Assert.Equal(7, replayed.Revisions.Count);
    }

    [Fact]
    public async Task Every_decision_has_a_reason()
    {
        var page = await demo.Use<ReadLedger>().PageAsync(demo.Caller, demo.Project.Id, 1, Cancellation);
        Assert.True(page.Count > 40);
        Assert.All(demo.Paths.SelectMany(p => p.Revisions), r => Assert.False(string.IsNullOrWhiteSpace(r.Decision.Reason)));
    }

    private static CoefficientReading Coefficient(RevisionReading revision, string term) => revision.Coefficients.Single(c => c.Term == term);

    private static double Round(double? value) => Math.Round(value!.Value, 2);
}
