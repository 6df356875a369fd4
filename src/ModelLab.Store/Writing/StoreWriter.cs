using System.Threading.Channels;
using Microsoft.EntityFrameworkCore;

namespace ModelLab.Store.Writing;

/// <summary>
/// The one queue of this process through which the store is written: first come, first served, one transaction at a
/// time. A transaction is short; what takes long is done before it is handed in.
/// </summary>
public sealed class StoreWriter : IAsyncDisposable
{
    private readonly Channel<Func<Task>> queue = Channel.CreateBounded<Func<Task>>(
        new BoundedChannelOptions(1024) { SingleReader = true, FullMode = BoundedChannelFullMode.Wait });

    private readonly IDbContextFactory<ModelLabContext> contexts;
    private readonly IStoreProvider provider;
    private readonly Task consumer;

    /// <summary>Opens the queue.</summary>
    public StoreWriter(IDbContextFactory<ModelLabContext> contexts, IStoreProvider provider)
    {
        this.contexts = contexts;
        this.provider = provider;
        consumer = Task.Run(ConsumeAsync);
    }

    /// <summary>
    /// Runs work in a transaction of its own, saves what it changed in the context and commits. If anything throws,
    /// nothing is stored. Cancelling takes effect until the work begins; then it runs to its end.
    /// </summary>
    /// <param name="work">What to do. It must not wait for another write.</param>
    /// <param name="cancellation">Withdraws the work while it waits in the queue.</param>
    /// <exception cref="StorageFailedException">The database could not do it, e.g. because the disk is full.</exception>
    public async Task<T> WriteAsync<T>(Func<ModelLabContext, Task<T>> work, CancellationToken cancellation)
    {
        var done = new TaskCompletionSource<T>(TaskCreationOptions.RunContinuationsAsynchronously);
        await queue.Writer.WriteAsync(() => RunAsync(work, done, cancellation), cancellation);
        return await done.Task;
    }

    /// <summary>Closes the queue after the writes that stand in it.</summary>
    public async ValueTask DisposeAsync()
    {
        queue.Writer.TryComplete();
        await consumer;
    }

    private async Task ConsumeAsync()
    {
        await foreach (var run in queue.Reader.ReadAllAsync())
        {
            await run();
        }
    }

    private async Task RunAsync<T>(Func<ModelLabContext, Task<T>> work, TaskCompletionSource<T> done, CancellationToken cancellation)
    {
        if (cancellation.IsCancellationRequested)
        {
            done.SetCanceled(cancellation);
            return;
        }

        try
        {
            done.SetResult(await InTransactionAsync(work));
        }
        catch (Exception e)
        {
            // Handed to the one who asked for the write; the queue itself goes on.
            done.SetException(provider.Explain(e) ?? e);
        }
    }

    private async Task<T> InTransactionAsync<T>(Func<ModelLabContext, Task<T>> work)
    {
        await using var context = await contexts.CreateDbContextAsync();
        context.ChangeTracker.AutoDetectChangesEnabled = false;
        await using var transaction = await provider.BeginWriteAsync(context, CancellationToken.None);
        var result = await work(context);
        context.ChangeTracker.DetectChanges();
        await context.SaveChangesAsync();
        await transaction.CommitAsync();
        return result;
    }
}
