namespace ModelLab.Web.Features.Demo;

/// <summary>Fills an empty store with the demo project and its people. Called in the Development environment only, once, before the server is ready.</summary>
public interface IDemoLoader
{
    /// <summary>Makes the demo through the same use cases that people use. A failure stops the start.</summary>
    Task LoadAsync(CancellationToken cancellation);
}
