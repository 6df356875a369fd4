using ModelLab.Ledger.Entries;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Entries;
using ModelLab.Projects.People;
using ModelLab.Projects.Tests.Hosting;
using ModelLab.Projects.Views;

namespace ModelLab.Projects.Tests;

/// <summary>People who leave, come back, or are named alike.</summary>
public sealed class MemberTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task A_person_who_left_learns_nothing_and_comes_back_with_another_role_and_the_old_acts()
    {
        var project = await bench.ProjectAsync();
        var members = bench.Get<ManageMembers>();
        var comments = bench.Get<ManageComments>();
        var comment = await comments.MakeAsync(new("reviewer"), project, new Place("project", project, null), "Which year?", Bench.Stop);
        await members.RemoveAsync(Bench.Owner, project, "reviewer", "moved", Bench.Stop);
        var gone = await Assert.ThrowsAsync<RefusedException>(() => comments.AllAsync(new("reviewer"), project, Bench.Stop));
        Assert.Equal(RefusalKind.NotFound, gone.Kind);
        Assert.Equal("The reviewer", (await comments.AllAsync(Bench.Owner, project, Bench.Stop)).Single(c => c.Id == comment.Id).By.Name);
        var back = await members.AddAsync(Bench.Owner, project, "REVIEWER@marrowvale.example", Role.Reader, "came back", Bench.Stop);
        Assert.Equal(Role.Reader, back.Role);
        Assert.Single(await comments.AllAsync(new("reviewer"), project, Bench.Stop));
        var refused = await Assert.ThrowsAsync<RefusedException>(() => comments.SettleAsync(new("reviewer"), project, comment.Id, "answered", Bench.Stop));
        Assert.Equal(RefusalKind.Forbidden, refused.Kind);
    }

    [Fact]
    public async Task Two_people_of_one_name_are_two()
    {
        var project = await bench.ProjectAsync();
        bench.Store.Add(new Person("twin", "The reviewer", "twin@marrowvale.example", true, false));
        await bench.Get<ManageMembers>().AddAsync(Bench.Owner, project, "twin@marrowvale.example", Role.Reader, "reads", Bench.Stop);
        await bench.Get<ManageMembers>().RemoveAsync(Bench.Owner, project, "twin", "wrong person", Bench.Stop);
        Assert.Equal(Role.Reviewer, bench.Store.Model(project).Find<MemberView>("reviewer")!.Role);
        Assert.Null(bench.Store.Model(project).Find<MemberView>("twin")!.Role);
    }

    [Fact]
    public async Task The_last_owner_stays_also_when_two_leave_at_once()
    {
        var project = await bench.ProjectAsync();
        var members = bench.Get<ManageMembers>();
        await members.ChangeRoleAsync(Bench.Owner, project, "analyst", Role.Owner, "shares the work", Bench.Stop);
        bench.Store.BeforeCommit = () => members.RemoveAsync(Bench.Owner, project, "analyst", "left", Bench.Stop).GetAwaiter().GetResult();
        var refused = await Assert.ThrowsAsync<RefusedException>(() => members.RemoveAsync(Bench.Owner, project, "owner", "left", Bench.Stop));
        Assert.Equal(RefusalKind.Conflict, refused.Kind);
        Assert.Equal(Role.Owner, bench.Store.Model(project).Find<MemberView>("owner")!.Role);
    }

    [Fact]
    public async Task An_account_that_is_disabled_during_the_work_records_nothing()
    {
        var project = await bench.ProjectAsync();
        var admission = await bench.Get<ProjectGate>().EnterAsync(Bench.Analyst, project, Role.Analyst, Bench.Stop);
        bench.Store.Add(admission.Person with { Active = false });
        var before = bench.Store.Entries(project).Count;
        var refused = await Assert.ThrowsAsync<RefusedException>(() => bench.Get<ProjectGate>().RecordAsync(
            admission, [new Act(new CommentMade("c", new Place("project", project, null), null, "late"))], null, Bench.Stop));
        Assert.Equal(RefusalKind.Forbidden, refused.Kind);
        Assert.Equal(before, bench.Store.Entries(project).Count);
    }

    [Fact]
    public async Task An_entry_keeps_the_name_as_it_was()
    {
        var project = await bench.ProjectAsync();
        bench.Store.Add(new Person("analyst", "Another name", "analyst@marrowvale.example", true, false));
        await bench.Get<ManageComments>().MakeAsync(Bench.Analyst, project, new Place("project", project, null), "hello", Bench.Stop);
        var entries = bench.Store.Entries(project).Select(b => LedgerEntry.Parse(b)).ToList();
        Assert.Equal("Another name", entries[^1].By.Name);
        Assert.Contains(entries, e => e.Kind == "member-joined/1" && e.Body["name"]!.GetValue<string>() == "The analyst");
    }
}
