using Microsoft.EntityFrameworkCore;
using ModelLab.Ledger.Entries;
using ModelLab.Projects;
using ModelLab.Store.Accounts;

namespace ModelLab.Store.Server;

/// <summary>Who may act on the people and tokens of the server, asked inside the transaction.</summary>
internal static class ServerActors
{
    /// <summary>Someone at the command line of the machine itself: no account, named so in the ledger.</summary>
    public static readonly Author CommandLine = new(ServerRecords.CommandLineActor, "Command line of the server");

    /// <summary>The author for an act that needs an administrator.</summary>
    public static async Task<Author> AdministratorAsync(ModelLabContext context, string actorId)
    {
        if (actorId == ServerRecords.CommandLineActor)
        {
            return CommandLine;
        }

        var account = await ActiveAsync(context, actorId);
        return account.Administrator
            ? new Author(account.Id, account.Name)
            : throw new RefusedException(RefusalKind.Forbidden, "Only an administrator of this server may do this.");
    }

    /// <summary>The author for an act on a person's own affairs: the person or an administrator.</summary>
    public static async Task<Author> PersonOrAdministratorAsync(ModelLabContext context, string actorId, string personId)
    {
        if (actorId != personId)
        {
            return await AdministratorAsync(context, actorId);
        }

        var account = await ActiveAsync(context, actorId);
        return new Author(account.Id, account.Name);
    }

    private static async Task<Account> ActiveAsync(ModelLabContext context, string personId) =>
        await context.Users.AsNoTracking().SingleOrDefaultAsync(a => a.Id == personId && a.Active)
        ?? throw new RefusedException(RefusalKind.Forbidden, "This account is disabled or does not exist; ask an administrator of this server.");
}
