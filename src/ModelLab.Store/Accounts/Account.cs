using Microsoft.AspNetCore.Identity;
using ModelLab.Projects.People;

namespace ModelLab.Store.Accounts;

/// <summary>A person's account on this server. User name and e-mail address are the same.</summary>
public sealed class Account : IdentityUser
{
    /// <summary>Printed name.</summary>
    public required string Name { get; set; }

    /// <summary>False once disabled.</summary>
    public bool Active { get; set; } = true;

    /// <summary>May manage the people of this server.</summary>
    public bool Administrator { get; set; }

    /// <summary>When the account was made.</summary>
    public DateTimeOffset EnrolledAt { get; set; }

    /// <summary>The account as use cases see it.</summary>
    public Person ToPerson() => new(Id, Name, Email ?? string.Empty, Active, Administrator);
}
