using ModelLab.Ledger;
using ModelLab.Store.Requests;
using ModelLab.Store.Tests.Setting;

namespace ModelLab.Store.Tests.Requests;

public sealed class IdempotencyRecordsTests
{
    private static readonly Sha256Hash Request = Sha256Hash.Of([1]);

    [Fact]
    public async Task A_repeated_request_gets_the_first_answer()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<IdempotencyRecords>();
        Assert.Equal(IdempotencyState.Started, (await records.BeginAsync("ada", "k", Request, TestStore.Cancellation)).State);
        Assert.Equal(IdempotencyState.Unfinished, (await records.BeginAsync("ada", "k", Request, TestStore.Cancellation)).State);
        await records.CompleteAsync("ada", "k", new StoredAnswer(201, "application/json", [1, 2]), TestStore.Cancellation);

        var again = await records.BeginAsync("ada", "k", Request, TestStore.Cancellation);
        Assert.Equal(IdempotencyState.Answered, again.State);
        Assert.Equal((201, "application/json"), (again.Answer!.Status, again.Answer.ContentType));
        Assert.Equal([1, 2], again.Answer.Body);
        Assert.Equal(IdempotencyState.OtherRequest, (await records.BeginAsync("ada", "k", Sha256Hash.Of([2]), TestStore.Cancellation)).State);
        Assert.Equal(IdempotencyState.Started, (await records.BeginAsync("ben", "k", Request, TestStore.Cancellation)).State);
    }

    [Fact]
    public async Task A_released_key_may_be_used_again_and_an_answered_one_is_not_released()
    {
        await using var store = await TestStore.StartAsync();
        var records = store.Get<IdempotencyRecords>();
        await records.BeginAsync("ada", "k", Request, TestStore.Cancellation);
        await records.ReleaseAsync("ada", "k", TestStore.Cancellation);
        Assert.Equal(IdempotencyState.Started, (await records.BeginAsync("ada", "k", Request, TestStore.Cancellation)).State);
        await records.CompleteAsync("ada", "k", new StoredAnswer(200, null, []), TestStore.Cancellation);
        await records.ReleaseAsync("ada", "k", TestStore.Cancellation);
        Assert.Equal(IdempotencyState.Answered, (await records.BeginAsync("ada", "k", Request, TestStore.Cancellation)).State);
        store.Time.Advance(IdempotencyRecords.Remembered + TimeSpan.FromSeconds(1));
        Assert.Equal(IdempotencyState.Started, (await records.BeginAsync("ada", "k", Request, TestStore.Cancellation)).State);
    }

    [Fact]
    public async Task Of_many_at_once_one_is_carried_out()
    {
        await using var store = await TestStore.StartAsync();
        var states = await Task.WhenAll(Enumerable.Range(0, 20).Select(_ => store.Get<IdempotencyRecords>().BeginAsync("ada", "k", Request, TestStore.Cancellation)));
        Assert.Single(states, s => s.State == IdempotencyState.Started);
    }
}
