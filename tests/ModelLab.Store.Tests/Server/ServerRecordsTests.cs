using System.Text.Json.Nodes;
using ModelLab.Ledger.Entries;
using ModelLab.Projects;
using ModelLab.Projects.People;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Server;

public sealed class ServerRecordsTests
{
    [Fact]
    public async Task The_set_up_token_makes_one_administrator_and_works_once()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var earlier = await records.CreateSetUpTokenAsync(TestStore.Cancellation);
        var token = await records.CreateSetUpTokenAsync(TestStore.Cancellation);
        await ForbiddenAsync(() => records.SetUpAsync(earlier!, "Eve", "eve@example.org", "hash", TestStore.Cancellation));
        await ForbiddenAsync(() => records.SetUpAsync("set-up-", "Eve", "eve@example.org", "hash", TestStore.Cancellation));

        var person = await records.SetUpAsync(token!, " Ada Anker ", "Ada@Example.org", "hash", TestStore.Cancellation);
        Assert.Equal(("Ada Anker", "Ada@Example.org", true, true), (person.Name, person.Email, person.Active, person.Administrator));
        await ForbiddenAsync(() => records.SetUpAsync(token!, "Eve", "eve@example.org", "hash", TestStore.Cancellation));
        Assert.Null(await records.CreateSetUpTokenAsync(TestStore.Cancellation));
        Assert.Equal(["first-set-up/1", "person-enrolled/1"], await KindsAsync(store));
        Assert.Equal(person, await store.Get<IPeople>().FindByEmailAsync(" ada@EXAMPLE.org ", TestStore.Cancellation));
    }

    [Fact]
    public async Task An_invited_person_sets_a_password_once()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var first = await records.EnrolAsync(ServerRecords.CommandLineActor, "Ben Bode", "ben@example.org", false, TestStore.Cancellation);
        var second = await records.InviteAgainAsync(ServerRecords.CommandLineActor, first.Person.Id, TestStore.Cancellation);

        Assert.Null(await records.FindInvitedAsync(first.Secret, TestStore.Cancellation));
        Assert.Equal(first.Person, await records.FindInvitedAsync(second.Secret, TestStore.Cancellation));
        await records.AcceptInvitationAsync(second.Secret, "the hash", TestStore.Cancellation);
        Assert.Equal("the hash", store.Value("SELECT PasswordHash FROM accounts"));
        await ForbiddenAsync(() => records.AcceptInvitationAsync(second.Secret, "another", TestStore.Cancellation));
        Assert.Equal(["person-enrolled/1", "person-invited-again/1", "invitation-taken-up/1"], await KindsAsync(store));
    }

    [Fact]
    public async Task An_invitation_ends_after_a_week()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var invitation = await records.EnrolAsync(ServerRecords.CommandLineActor, "Ben Bode", "ben@example.org", false, TestStore.Cancellation);
        store.Time.Advance(TimeSpan.FromDays(7));
        Assert.Null(await records.FindInvitedAsync(invitation.Secret, TestStore.Cancellation));
    }

    [Theory]
    [InlineData("", "x@example.org", "name")]
    [InlineData("X", "", "email")]
    [InlineData("X", "x", "email")]
    [InlineData("X", "x@y@example.org", "email")]
    [InlineData("X", "x y@example.org", "email")]
    public async Task A_wrong_field_is_named(string name, string email, string column)
    {
        await using var store = await TestStore.StartAsync();
        var refusal = await Assert.ThrowsAsync<RefusedException>(
            () => store.Get<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, name, email, false, TestStore.Cancellation));
        Assert.Equal(column, Assert.Single(refusal.Details).Column);
        Assert.Equal(0L, store.Value("SELECT count(*) FROM ledger_entries"));
    }

    [Fact]
    public async Task An_address_has_one_account_whatever_its_case()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        await records.EnrolAsync(ServerRecords.CommandLineActor, "Ben", "ben@example.org", false, TestStore.Cancellation);
        var refusal = await Assert.ThrowsAsync<RefusedException>(
            () => records.EnrolAsync(ServerRecords.CommandLineActor, "Ben", "BEN@example.org", false, TestStore.Cancellation));
        Assert.Equal(RefusalKind.Conflict, refusal.Kind);
    }

    [Fact]
    public async Task Only_an_active_administrator_manages_people()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var ada = (await records.EnrolAsync(ServerRecords.CommandLineActor, "Ada", "ada@example.org", true, TestStore.Cancellation)).Person;
        var ben = (await records.EnrolAsync(ada.Id, "Ben", "ben@example.org", false, TestStore.Cancellation)).Person;
        await ForbiddenAsync(() => records.EnrolAsync(ben.Id, "Eve", "eve@example.org", true, TestStore.Cancellation));
        await ForbiddenAsync(() => records.DisableAsync(ben.Id, ada.Id, "No.", TestStore.Cancellation));
        await ForbiddenAsync(() => records.InviteAgainAsync("nobody", ben.Id, TestStore.Cancellation));

        var last = await Assert.ThrowsAsync<RefusedException>(() => records.DisableAsync(ada.Id, ada.Id, "Leaving", TestStore.Cancellation));
        Assert.Equal(RefusalKind.Conflict, last.Kind);
        var cem = (await records.EnrolAsync(ada.Id, "Cem", "cem@example.org", true, TestStore.Cancellation)).Person;
        await records.DisableAsync(cem.Id, ada.Id, "Left the team", TestStore.Cancellation);
        await ForbiddenAsync(() => records.EnrolAsync(ada.Id, "Eve", "eve@example.org", true, TestStore.Cancellation));

        var entry = await store.Projects.EntryAsync("server", 4, TestStore.Cancellation);
        Assert.Equal(("person-disabled/1", "Left the team", "Cem"), (entry.Kind, entry.Reason, entry.By.Name));
        Assert.True((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Ok);
    }

    [Fact]
    public async Task Disabling_ends_invitations_and_sessions_and_enabling_brings_the_person_back()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var invitation = await records.EnrolAsync(ServerRecords.CommandLineActor, "Ben", "ben@example.org", false, TestStore.Cancellation);
        var stamp = store.Value("SELECT SecurityStamp FROM accounts");
        await Assert.ThrowsAsync<RefusedException>(() => records.DisableAsync(ServerRecords.CommandLineActor, invitation.Person.Id, " ", TestStore.Cancellation));
        await records.DisableAsync(ServerRecords.CommandLineActor, invitation.Person.Id, "Left", TestStore.Cancellation);
        await records.DisableAsync(ServerRecords.CommandLineActor, invitation.Person.Id, "Left", TestStore.Cancellation);

        Assert.Null(await records.FindInvitedAsync(invitation.Secret, TestStore.Cancellation));
        Assert.NotEqual(stamp, store.Value("SELECT SecurityStamp FROM accounts"));
        Assert.False((await store.Get<IPeople>().FindAsync(invitation.Person.Id, TestStore.Cancellation))!.Active);
        await records.EnableAsync(ServerRecords.CommandLineActor, invitation.Person.Id, "Came back", TestStore.Cancellation);
        Assert.True(Assert.Single(await records.PeopleAsync(TestStore.Cancellation)).Active);
        Assert.Equal(["person-enrolled/1", "person-disabled/1", "person-enabled/1"], await KindsAsync(store));
    }

    [Theory]
    [InlineData("Ben\nAda", "ben@example.org", "name")]
    [InlineData("Ben\0", "ben@example.org", "name")]
    [InlineData("\u202eneB", "ben@example.org", "name")]
    [InlineData("\u200b", "ben@example.org", "name")]
    [InlineData("Ben", "ben\uffff@example.org", "email")]
    [InlineData("Ben", "ben\u200b@example.org", "email")]
    public async Task A_name_or_address_that_shows_something_else_is_refused(string name, string email, string field)
    {
        await using var store = await TestStore.StartAsync();
        var refusal = await Assert.ThrowsAsync<RefusedException>(
            () => store.Get<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, name, email, false, TestStore.Cancellation));
        Assert.True(field == "email" ? refusal.Message.StartsWith("An e-mail address", StringComparison.Ordinal) : refusal.Details.Single().Column == field, refusal.Message);
        Assert.Equal(0L, store.Value("SELECT count(*) FROM accounts"));
    }

    [Fact]
    public async Task A_reason_is_text_of_bearable_length()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var ben = (await records.EnrolAsync(ServerRecords.CommandLineActor, "Ben", "ben@example.org", false, TestStore.Cancellation)).Person.Id;
        foreach (var reason in new[] { new string('r', Reasons.LongestText + 1), "\u001b[31m", "\u200b\u2060" })
        {
            await Assert.ThrowsAsync<RefusedException>(() => records.DisableAsync(ServerRecords.CommandLineActor, ben, reason, TestStore.Cancellation));
        }

        Assert.Equal(["person-enrolled/1"], await KindsAsync(store));
    }

    [Fact]
    public async Task Taking_up_an_invitation_stands_in_the_ledger()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<ServerRecords>();
        var invitation = await records.EnrolAsync(ServerRecords.CommandLineActor, "Ben", "ben@example.org", false, TestStore.Cancellation);
        await records.AcceptInvitationAsync(invitation.Secret, "a hash", TestStore.Cancellation);
        var entry = await store.Projects.EntryAsync("server", 2, TestStore.Cancellation);
        Assert.Equal(("invitation-taken-up/1", "Ben"), (entry.Kind, entry.By.Name));
    }

    [Fact]
    public async Task No_account_without_its_entry_and_no_entry_without_its_account()
    {
        await using var store = await TestStore.StartAsync();
        store.Sql("CREATE TRIGGER injected BEFORE INSERT ON invitations BEGIN SELECT RAISE(ABORT, 'injected'); END");
        await Assert.ThrowsAnyAsync<Exception>(
            () => store.Get<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, "Ben", "ben@example.org", false, TestStore.Cancellation));
        Assert.Equal(0L, store.Value("SELECT (SELECT count(*) FROM accounts) + (SELECT count(*) FROM ledger_entries)"));
    }

    internal static async Task<IReadOnlyList<string>> KindsAsync(TestStore store)
    {
        var kinds = new List<string>();
        await foreach (var bytes in store.Projects.EntriesAsync("server", 1, TestStore.Cancellation))
        {
            var entry = LedgerEntry.Parse(bytes);
            Assert.IsType<JsonObject>(entry.Body);
            kinds.Add(entry.Kind);
        }

        return kinds;
    }

    private static async Task ForbiddenAsync(Func<Task> act) => Assert.Equal(RefusalKind.Forbidden, (await Assert.ThrowsAsync<RefusedException>(act)).Kind);
}
