namespace ModelLab.Web.Verbs;

/// <summary>An option of a verb.</summary>
/// <param name="Name">Its name, without the dashes.</param>
/// <param name="Value">What its value is, for the help.</param>
/// <param name="Needed">Whether it has to be given.</param>
public sealed record VerbOption(string Name, string Value, bool Needed = true);

/// <summary>
/// A task of administration that the server program does instead of serving: with the same settings, beside a running server or
/// without one. Its result alone goes to standard output, all else to standard error.
/// </summary>
public interface IVerb
{
    /// <summary>The word on the command line.</summary>
    string Name { get; }

    /// <summary>What it does, in one line.</summary>
    string Summary { get; }

    /// <summary>Its options.</summary>
    IReadOnlyList<VerbOption> Options { get; }

    /// <summary>Does it.</summary>
    /// <param name="options">The options given.</param>
    /// <param name="services">The services of the program, not started.</param>
    /// <param name="output">Standard output, for the result alone.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <returns>The exit code: 0 done, 1 not.</returns>
    Task<int> RunAsync(IReadOnlyDictionary<string, string> options, IServiceProvider services, TextWriter output, CancellationToken cancellation);
}

/// <summary>The command line is wrong; the program ends with code 2.</summary>
public sealed class UsageException(string message) : Exception(message);
