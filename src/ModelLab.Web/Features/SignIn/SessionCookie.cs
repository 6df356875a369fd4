using System.Globalization;
using System.Security.Claims;
using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Authentication.Cookies;
using Microsoft.AspNetCore.Identity;
using ModelLab.Store.Accounts;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Features.SignIn;

/// <summary>The cookie of a session.</summary>
public static class SessionCookie
{
    /// <summary>Its name.</summary>
    public const string Name = "ModelLab.Session";

    /// <summary>When the person signed in. The cookie's own time of issue moves on whenever it is renewed.</summary>
    private const string SignedInAt = "signed-in-at";

    /// <summary>Sets the cookie up: out of reach of scripts, not sent along from other sites, and asked of the account at every request.</summary>
    public static void Configure(CookieAuthenticationOptions options, SignInSettings settings)
    {
        options.Cookie.Name = Name;
        options.Cookie.HttpOnly = true;
        options.Cookie.SameSite = SameSiteMode.Lax;
        options.Cookie.SecurePolicy = CookieSecurePolicy.SameAsRequest;
        options.ExpireTimeSpan = TimeSpan.FromHours(settings.SessionHours);
        options.SlidingExpiration = true;
        options.LoginPath = "/sign-in";
        options.LogoutPath = "/sign-out";
        options.AccessDeniedPath = "/";
        options.ReturnUrlParameter = "returnUrl";
        options.Events.OnSigningIn = context =>
        {
            context.Properties.SetString(SignedInAt, Now(context.HttpContext).ToString("O", CultureInfo.InvariantCulture));
            return Task.CompletedTask;
        };
        options.Events.OnValidatePrincipal = context => ValidateAsync(context, TimeSpan.FromHours(settings.LongestSessionHours));
        options.Events.OnRedirectToLogin = context => StatusOrRedirect(context, StatusCodes.Status401Unauthorized);
        options.Events.OnRedirectToAccessDenied = context => StatusOrRedirect(context, StatusCodes.Status403Forbidden);
    }

    private static DateTimeOffset Now(HttpContext context) => context.RequestServices.GetRequiredService<TimeProvider>().GetUtcNow();

    /// <summary>
    /// A session ends at once when its person is disabled, signs out or chooses a new password: each changes the account's security
    /// stamp. However much it is used, it ends when it has lasted its longest.
    /// </summary>
    private static async Task ValidateAsync(CookieValidatePrincipalContext context, TimeSpan longest)
    {
        if (!DateTimeOffset.TryParse(context.Properties.GetString(SignedInAt), CultureInfo.InvariantCulture, out var since) || Now(context.HttpContext) - since >= longest)
        {
            context.RejectPrincipal();
            return;
        }

        var accounts = context.HttpContext.RequestServices.GetRequiredService<UserManager<Account>>();
        var id = context.Principal?.FindFirstValue(ClaimTypes.NameIdentifier);
        var account = id is null ? null : await accounts.FindByIdAsync(id);
        var stamp = context.Principal?.FindFirstValue(accounts.Options.ClaimsIdentity.SecurityStampClaimType);
        if (account is not { Active: true } || account.SecurityStamp != stamp)
        {
            context.RejectPrincipal();
        }
    }

    /// <summary>A person at a page is led to the sign-in page; a program gets the status.</summary>
    private static Task StatusOrRedirect(RedirectContext<CookieAuthenticationOptions> context, int status)
    {
        var page = HttpMethods.IsGet(context.Request.Method)
            && !context.Request.Path.StartsWithSegments("/api", StringComparison.Ordinal)
            && context.Request.Headers.Accept.ToString().Contains("text/html", StringComparison.OrdinalIgnoreCase);
        if (page)
        {
            context.Response.Redirect(context.RedirectUri);
        }
        else
        {
            context.Response.StatusCode = status;
        }

        return Task.CompletedTask;
    }
}
