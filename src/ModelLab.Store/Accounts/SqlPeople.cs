using Microsoft.AspNetCore.Identity;
using Microsoft.EntityFrameworkCore;
using ModelLab.Projects.People;

namespace ModelLab.Store.Accounts;

/// <summary>The people of this server, read from their accounts at each call.</summary>
public sealed class SqlPeople(IDbContextFactory<ModelLabContext> contexts) : IPeople
{
    private static readonly UpperInvariantLookupNormalizer Normalizer = new();

    /// <inheritdoc/>
    public async Task<Person?> FindAsync(string personId, CancellationToken cancellation)
    {
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        return (await context.Users.AsNoTracking().SingleOrDefaultAsync(a => a.Id == personId, cancellation))?.ToPerson();
    }

    /// <inheritdoc/>
    public async Task<Person?> FindByEmailAsync(string email, CancellationToken cancellation)
    {
        var normalized = Normalizer.NormalizeEmail(email.Trim());
        await using var context = await contexts.CreateDbContextAsync(cancellation);
        return (await context.Users.AsNoTracking().SingleOrDefaultAsync(a => a.NormalizedEmail == normalized, cancellation))?.ToPerson();
    }
}
