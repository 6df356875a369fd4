namespace ModelLab.Projects.People;

/// <summary>What a person may do in a project; each role may do what those before it may.</summary>
public enum Role
{
    /// <summary>Look.</summary>
    Reader,

    /// <summary>Comment, answer findings and sign.</summary>
    Reviewer,

    /// <summary>Take decisions.</summary>
    Analyst,

    /// <summary>Manage people and settings.</summary>
    Owner,
}

/// <summary>A person with an account on this server.</summary>
/// <param name="Id">Stable id.</param>
/// <param name="Name">Printed name.</param>
/// <param name="Email">Address by which the person signs in.</param>
/// <param name="Active">False once disabled: may do nothing more.</param>
/// <param name="Administrator">May manage people of the server.</param>
public sealed record Person(string Id, string Name, string Email, bool Active, bool Administrator);

/// <summary>The people of this server. Read anew at each call, so that a disabled person stops at once.</summary>
public interface IPeople
{
    /// <summary>The person of an id, or null.</summary>
    Task<Person?> FindAsync(string personId, CancellationToken cancellation);

    /// <summary>The person of an e-mail address (compared without case), or null.</summary>
    Task<Person?> FindByEmailAsync(string email, CancellationToken cancellation);
}

/// <summary>Who calls a use case.</summary>
/// <param name="PersonId">Id of the person, as established by sign-in or token.</param>
/// <param name="MayWrite">False for a token of read scope.</param>
public sealed record Caller(string PersonId, bool MayWrite = true);
