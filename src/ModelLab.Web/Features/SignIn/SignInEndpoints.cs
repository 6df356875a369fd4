using System.Globalization;
using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Identity;
using ModelLab.Projects;
using ModelLab.Projects.People;
using ModelLab.Store.Accounts;
using ModelLab.Store.Server;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;

namespace ModelLab.Web.Features.SignIn;

/// <summary>Signing in and out, first set-up, and taking up an invitation: as JSON for programs, as forms for pages.</summary>
public static class SignInEndpoints
{
    /// <summary>Name of the limit on attempts from one address.</summary>
    public const string AttemptsPolicy = "sign-in";

    /// <summary>Maps the endpoints.</summary>
    public static void MapSignIn(this IEndpointRouteBuilder endpoints)
    {
        var group = endpoints.MapGroup(string.Empty).AllowAnonymous().WithTags("Sign-in").RequireRateLimiting(AttemptsPolicy);
        group.MapPost("/sign-in", SignInAsync)
            .WithName("SignIn")
            .WithSummary("Signs a person in by e-mail address and password; the session is a cookie.")
            .Accepts<SignInRequest>("application/json", FormBody.MediaType)
            .Produces<PersonAnswer>()
            .WithProblems(400, 401, 403, 422, 429);
        group.MapPost("/set-up", SetUpAsync)
            .WithName("SetUp")
            .WithSummary("First set-up: makes the first administrator, with the token from the server's console. The token works once.")
            .Accepts<SetUpRequest>("application/json", FormBody.MediaType)
            .Produces<PersonAnswer>(StatusCodes.Status201Created)
            .WithProblems(400, 403, 422, 429);
        group.MapPost("/invitations/{token}", AcceptAsync)
            .WithName("AcceptInvitation")
            .WithSummary("Takes up an invitation by choosing a password. Sessions and API tokens that the person had hold no longer.")
            .Accepts<PasswordRequest>("application/json", FormBody.MediaType)
            .Produces<PersonAnswer>()
            .WithProblems(400, 403, 422, 429);
        endpoints.MapPost("/sign-out", SignOutAsync)
            .AllowAnonymous()
            .WithTags("Sign-in")
            .WithName("SignOut")
            .WithSummary("Ends all sessions of the person, in every browser; API tokens stay.")
            .Produces(StatusCodes.Status204NoContent);
    }

    private static async Task<IResult> SignInAsync(HttpContext context, SignInDesk desk, SignInManager<Account> sessions, CancellationToken cancellation)
    {
        var body = await FormBody.ReadAsync<SignInRequest>(context.Request, f => new SignInRequest(f("email"), f("password")), cancellation);
        var result = await desk.TryAsync(body.Value.Email, body.Value.Password, CallerAddress.Of(context), cancellation);
        if (result.Account is { } account)
        {
            await sessions.SignInAsync(account, isPersistent: false);
            return body.IsForm ? Results.Redirect(LocalAddress(context.Request.Query["returnUrl"])) : Results.Ok(PersonAnswer.Of(account.ToPerson()));
        }

        return body.IsForm ? Results.Redirect(PageAfter(context, result)) : Refusal(context, result);
    }

    private static string PageAfter(HttpContext context, SignInResult result) =>
        $"/sign-in?refused={result.Outcome}&returnUrl={Uri.EscapeDataString(LocalAddress(context.Request.Query["returnUrl"]))}";

    private static IResult Refusal(HttpContext context, SignInResult result)
    {
        switch (result.Outcome)
        {
            case SignInOutcome.LockedOut:
                var until = result.Until!.Value.UtcDateTime;
                context.Response.Headers.RetryAfter = until.ToString("R", CultureInfo.InvariantCulture);
                return new ProblemResult(
                    StatusCodes.Status429TooManyRequests, "lockedOut",
                    string.Create(CultureInfo.InvariantCulture, $"There were too many failed attempts. Try again after {until:HH:mm} UTC; an administrator can send a new invitation."));
            case SignInOutcome.Disabled:
                return new ProblemResult(StatusCodes.Status403Forbidden, "disabled", "This account is disabled. Ask an administrator of the server.");
            default:
                return new ProblemResult(StatusCodes.Status401Unauthorized, "wrongPassword", "The e-mail address or the password is not right.");
        }
    }

    /// <summary>The browser forgets its cookie; what was copied of it is dead because the account's sessions end.</summary>
    private static async Task<IResult> SignOutAsync(HttpContext context, ServerRecords records, CancellationToken cancellation)
    {
        // The session is asked for by name: what an Authorization header says does not count here, nor does a cookie that holds no longer.
        var session = await context.AuthenticateAsync(IdentityConstants.ApplicationScheme);
        if (session.Principal is { } person)
        {
            await records.EndSessionsAsync(person.PersonId(), cancellation);
        }

        await context.SignOutAsync(IdentityConstants.ApplicationScheme);
        return FormBody.IsForm(context.Request) ? Results.Redirect("/") : Results.NoContent();
    }

    private static async Task<IResult> SetUpAsync(HttpContext context, ServerRecords records, PasswordRules rules, IPasswordHasher<Account> hasher, CancellationToken cancellation)
    {
        var body = await FormBody.ReadAsync<SetUpRequest>(context.Request, f => new SetUpRequest(f("token"), f("email"), f("name"), f("password")), cancellation);
        var (token, email, name, password) = body.Value;
        rules.Check(password, name, email);
        var person = await records.SetUpAsync(token.Trim(), name, email, hasher.HashPassword(null!, password), cancellation);
        return body.IsForm ? Results.Redirect("/sign-in") : Results.Json(PersonAnswer.Of(person), statusCode: StatusCodes.Status201Created);
    }

    private static async Task<IResult> AcceptAsync(
        HttpContext context, string token, ServerRecords records, PasswordRules rules, IPasswordHasher<Account> hasher, CancellationToken cancellation)
    {
        var body = await FormBody.ReadAsync<PasswordRequest>(context.Request, f => new PasswordRequest(f("password")), cancellation);
        var invited = await records.FindInvitedAsync(token, cancellation)
            ?? throw new RefusedException(RefusalKind.Forbidden, "This invitation was used, replaced or has expired; ask an administrator for a new one.");
        rules.Check(body.Value.Password, invited.Name, invited.Email);
        var person = await records.AcceptInvitationAsync(token, hasher.HashPassword(null!, body.Value.Password), cancellation);
        return body.IsForm ? Results.Redirect("/sign-in") : Results.Ok(PersonAnswer.Of(person));
    }

    /// <summary>Only addresses of this server: a link to the sign-in page must not lead on to another site.</summary>
    private static string LocalAddress(string? address) =>
        address is ['/', ..] && !address.StartsWith("//", StringComparison.Ordinal) && !address.Contains('\\', StringComparison.Ordinal) && !address.Any(char.IsControl)
            ? address
            : "/";
}

/// <summary>E-mail address and password.</summary>
public sealed record SignInRequest(string Email, string Password);

/// <summary>First set-up.</summary>
/// <param name="Token">The one-time token from the server's console.</param>
/// <param name="Email">Address by which the administrator will sign in.</param>
/// <param name="Name">Printed name.</param>
/// <param name="Password">Password.</param>
public sealed record SetUpRequest(string Token, string Email, string Name, string Password);

/// <summary>A chosen password.</summary>
public sealed record PasswordRequest(string Password);

/// <summary>A person with an account.</summary>
/// <param name="Id">Stable id.</param>
/// <param name="Name">Printed name.</param>
/// <param name="Email">Address by which the person signs in.</param>
/// <param name="Active">False once disabled.</param>
/// <param name="Administrator">May manage people of the server.</param>
public sealed record PersonAnswer(string Id, string Name, string Email, bool Active, bool Administrator)
{
    /// <summary>The answer for a person.</summary>
    public static PersonAnswer Of(Person person) => new(person.Id, person.Name, person.Email, person.Active, person.Administrator);
}
