namespace ModelLab.Web.Startup;

/// <summary>How far the start has come. Nothing but the health endpoints answers before it is done.</summary>
public sealed class Readiness
{
    private readonly TaskCompletionSource done = new(TaskCreationOptions.RunContinuationsAsynchronously);

    /// <summary>Completes when the server is ready; fails when the start has failed.</summary>
    public Task Done => done.Task;

    /// <summary>Whether the server is ready.</summary>
    public bool IsReady => done.Task.IsCompletedSuccessfully;

    /// <summary>What is being done at the moment, in plain words.</summary>
    public string Stage { get; private set; } = "starting";

    /// <summary>Says what is being done.</summary>
    public void Now(string stage) => Stage = stage;

    /// <summary>The start is done.</summary>
    public void Ready()
    {
        Stage = "ready";
        done.TrySetResult();
    }

    /// <summary>The start has failed.</summary>
    public void Failed(Exception cause)
    {
        Stage = "failed";
        done.TrySetException(cause);

        // Whoever waits sees it; nobody has to.
        _ = done.Task.Exception;
    }
}
