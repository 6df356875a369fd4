using ModelLab.Projects;
using ModelLab.Store.Server;
using ModelLab.Store.Sqlite.Upkeep;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Server;

public sealed class ApiTokensTests
{
    private static readonly TimeSpan Month = TimeSpan.FromDays(30);

    [Fact]
    public async Task A_token_speaks_for_its_person_and_its_secret_is_not_stored()
    {
        await using var store = await TestStore.StartAsync();
        var person = await EnrolAsync(store, "ben@example.org");
        var issued = await store.Get<ApiTokens>().IssueAsync(person, person, "nightly run", TokenScope.Write, Month, TestStore.Cancellation);

        Assert.StartsWith("ml_", issued.Secret, StringComparison.Ordinal);
        Assert.Equal(46, issued.Secret.Length);
        var holder = await store.Get<ApiTokens>().FindHolderAsync(issued.Secret, TestStore.Cancellation);
        Assert.Equal((person, TokenScope.Write, issued.Token.Id), (holder!.Person.Id, holder.Scope, holder.TokenId));
        Assert.Equal(store.Time.GetUtcNow() + Month, holder.ExpiresAt);
        Assert.Equal(0L, store.Value($"SELECT count(*) FROM ledger_entries WHERE instr(canonical_bytes, '{issued.Secret}') > 0"));
        Assert.Equal("token-issued/1", (await ServerRecordsTests.KindsAsync(store))[^1]);
        Assert.NotNull(Assert.Single(await store.Get<ApiTokens>().OfPersonAsync(person, TestStore.Cancellation)).LastUsedAt);
    }

    [Fact]
    public async Task One_that_is_unknown_expired_revoked_or_of_a_disabled_person_speaks_for_nobody()
    {
        await using var store = await TestStore.StartAsync();
        var tokens = store.Get<ApiTokens>();
        var person = await EnrolAsync(store, "ben@example.org");
        Assert.Null(await tokens.FindHolderAsync("ml_unknown", TestStore.Cancellation));

        var revoked = await tokens.IssueAsync(person, person, "a", TokenScope.Read, Month, TestStore.Cancellation);
        await tokens.RevokeAsync(person, revoked.Token.Id, TestStore.Cancellation);
        await tokens.RevokeAsync(person, revoked.Token.Id, TestStore.Cancellation);
        Assert.Null(await tokens.FindHolderAsync(revoked.Secret, TestStore.Cancellation));
        Assert.Equal(["person-enrolled/1", "token-issued/1", "token-revoked/1"], await ServerRecordsTests.KindsAsync(store));

        var other = await tokens.IssueAsync(ServerRecords.CommandLineActor, person, "b", TokenScope.Read, Month, TestStore.Cancellation);
        await store.Get<ServerRecords>().DisableAsync(ServerRecords.CommandLineActor, person, "Left", TestStore.Cancellation);
        Assert.Null(await tokens.FindHolderAsync(other.Secret, TestStore.Cancellation));
        await store.Get<ServerRecords>().EnableAsync(ServerRecords.CommandLineActor, person, "Back", TestStore.Cancellation);
        Assert.NotNull(await tokens.FindHolderAsync(other.Secret, TestStore.Cancellation));
        store.Time.Advance(Month);
        Assert.Null(await tokens.FindHolderAsync(other.Secret, TestStore.Cancellation));
    }

    [Fact]
    public async Task Nobody_but_an_administrator_touches_the_tokens_of_another()
    {
        await using var store = await TestStore.StartAsync();
        var tokens = store.Get<ApiTokens>();
        var ben = await EnrolAsync(store, "ben@example.org");
        var eve = await EnrolAsync(store, "eve@example.org");
        var ada = await EnrolAsync(store, "ada@example.org", administrator: true);
        var issued = await tokens.IssueAsync(ben, ben, "a", TokenScope.Read, Month, TestStore.Cancellation);
        Assert.Equal(RefusalKind.Forbidden, (await Assert.ThrowsAsync<RefusedException>(() => tokens.RevokeAsync(eve, issued.Token.Id, TestStore.Cancellation))).Kind);
        Assert.Equal(RefusalKind.Forbidden, (await Assert.ThrowsAsync<RefusedException>(
            () => tokens.IssueAsync(eve, ben, "a", TokenScope.Read, Month, TestStore.Cancellation))).Kind);
        Assert.NotNull((await tokens.RevokeAsync(ada, issued.Token.Id, TestStore.Cancellation)).RevokedAt);
    }

    [Fact]
    public async Task Taking_up_an_invitation_revokes_the_persons_tokens_that_hold()
    {
        await using var store = await TestStore.StartAsync();
        var tokens = store.Get<ApiTokens>();
        var ben = await EnrolAsync(store, "ben@example.org");
        var eve = await EnrolAsync(store, "eve@example.org");
        await tokens.IssueAsync(ben, ben, "expired", TokenScope.Read, TimeSpan.FromDays(1), TestStore.Cancellation);
        store.Time.Advance(TimeSpan.FromDays(1));
        var first = await tokens.IssueAsync(ben, ben, "a", TokenScope.Read, Month, TestStore.Cancellation);
        var second = await tokens.IssueAsync(ben, ben, "b", TokenScope.Write, Month, TestStore.Cancellation);
        var hers = await tokens.IssueAsync(eve, eve, "c", TokenScope.Read, Month, TestStore.Cancellation);
        var records = store.Get<ServerRecords>();
        var invitation = await records.InviteAgainAsync(ServerRecords.CommandLineActor, ben, TestStore.Cancellation);
        Assert.NotNull(await tokens.FindHolderAsync(first.Secret, TestStore.Cancellation));
        var before = (await ServerRecordsTests.KindsAsync(store)).Count;

        // Where a revocation cannot be stored, the password is not either.
        store.Sql("CREATE TRIGGER injected BEFORE UPDATE OF revoked_at ON api_tokens BEGIN SELECT RAISE(ABORT, 'injected'); END");
        await Assert.ThrowsAnyAsync<Exception>(() => records.AcceptInvitationAsync(invitation.Secret, "a hash", TestStore.Cancellation));
        Assert.Equal(0L, store.Value("SELECT count(*) FROM accounts WHERE PasswordHash IS NOT NULL"));
        store.Sql("DROP TRIGGER injected");

        await records.AcceptInvitationAsync(invitation.Secret, "a hash", TestStore.Cancellation);
        Assert.Null(await tokens.FindHolderAsync(first.Secret, TestStore.Cancellation));
        Assert.Null(await tokens.FindHolderAsync(second.Secret, TestStore.Cancellation));
        Assert.NotNull(await tokens.FindHolderAsync(hers.Secret, TestStore.Cancellation));
        Assert.Equal(["invitation-taken-up/1", "token-revoked/1", "token-revoked/1"], (await ServerRecordsTests.KindsAsync(store)).Skip(before));
        var entry = await store.Projects.EntryAsync("server", before + 2, TestStore.Cancellation);
        Assert.Equal(("token-revoked/1", ben), (entry.Kind, entry.By.PersonId));
        Assert.True((await store.Get<StoreCheck>().RunAsync(TestStore.Cancellation)).Ok);
    }

    [Theory]
    [InlineData("", 30, "name")]
    [InlineData("a", 0, "days")]
    [InlineData("a", 400, "days")]
    public async Task A_wrong_field_is_named(string name, int days, string column)
    {
        await using var store = await TestStore.StartAsync();
        var person = await EnrolAsync(store, "ben@example.org");
        var refusal = await Assert.ThrowsAsync<RefusedException>(
            () => store.Get<ApiTokens>().IssueAsync(person, person, name, TokenScope.Read, TimeSpan.FromDays(days), TestStore.Cancellation));
        Assert.Equal(column, Assert.Single(refusal.Details).Column);
    }

    private static async Task<string> EnrolAsync(TestStore store, string email, bool administrator = false) =>
        (await store.Get<ServerRecords>().EnrolAsync(ServerRecords.CommandLineActor, email, email, administrator, TestStore.Cancellation)).Person.Id;
}
