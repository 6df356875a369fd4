using ModelLab.Projects.People;
using ModelLab.Projects.Tests.Hosting;

namespace ModelLab.Projects.Tests;

public sealed class ManageMembersTests : IDisposable
{
    private readonly Bench bench = new();

    public void Dispose() => bench.Dispose();

    [Fact]
    public async Task The_last_owner_whose_account_is_active_stays_owner()
    {
        var project = await bench.ProjectAsync();
        var members = bench.Get<ManageMembers>();
        await members.ChangeRoleAsync(Bench.Owner, project, "analyst", Role.Owner, "second owner", Bench.Stop);
        var analyst = (await bench.Store.FindAsync("analyst", Bench.Stop))!;
        bench.Store.Add(analyst with { Active = false });

        Assert.Equal(RefusalKind.Conflict, (await Assert.ThrowsAsync<RefusedException>(() => members.RemoveAsync(Bench.Owner, project, "owner", "leaves", Bench.Stop))).Kind);
        Assert.Equal(RefusalKind.Conflict, (await Assert.ThrowsAsync<RefusedException>(
            () => members.ChangeRoleAsync(Bench.Owner, project, "owner", Role.Reader, "steps back", Bench.Stop))).Kind);

        // With both accounts active either may go.
        bench.Store.Add(analyst);
        await members.RemoveAsync(Bench.Owner, project, "owner", "leaves", Bench.Stop);
    }

    [Fact]
    public async Task An_owner_whose_account_is_disabled_can_be_removed()
    {
        var project = await bench.ProjectAsync();
        var members = bench.Get<ManageMembers>();
        await members.ChangeRoleAsync(Bench.Owner, project, "analyst", Role.Owner, "second owner", Bench.Stop);
        bench.Store.Add((await bench.Store.FindAsync("analyst", Bench.Stop))! with { Active = false });
        await members.RemoveAsync(Bench.Owner, project, "analyst", "left the team", Bench.Stop);
    }
}
