using System.Threading.RateLimiting;
using Microsoft.AspNetCore.Authentication.Cookies;
using Microsoft.AspNetCore.DataProtection;
using Microsoft.AspNetCore.DataProtection.KeyManagement;
using Microsoft.AspNetCore.DataProtection.Repositories;
using Microsoft.AspNetCore.Identity;
using ModelLab.Store;
using ModelLab.Store.Accounts;
using ModelLab.Store.Keys;
using ModelLab.Web.Features.Tokens;
using ModelLab.Web.Http;
using ModelLab.Web.Settings;

namespace ModelLab.Web.Features.SignIn;

/// <summary>Registers accounts, sessions, API tokens and the limit on attempts.</summary>
public static class SignInRegistration
{
    /// <summary>The scheme that decides by the request: an <c>Authorization</c> header means a token, else the session counts.</summary>
    public const string EitherScheme = "ModelLab";

    /// <summary>
    /// Rounds of PBKDF2 with HMAC-SHA-512: what OWASP's password storage cheat sheet asks for at least (210,000; recalled).
    /// </summary>
    private const int HashingRounds = 210_000;

    /// <summary>Registers all of it.</summary>
    public static void AddSignIn(this IServiceCollection services, ServerSettings settings)
    {
        services.AddDataProtection().SetApplicationName("ModelLab");
        services.AddOptions<KeyManagementOptions>().Configure<ILoggerFactory>((o, log) => o.XmlRepository = SessionKeys(settings.Storage, log));
        services.AddIdentityCore<Account>(o =>
            {
                // The user name is the e-mail address, whose characters are not for this library to choose.
                o.User.AllowedUserNameCharacters = string.Empty;
                o.User.RequireUniqueEmail = true;
            })
            .AddEntityFrameworkStores<ModelLabContext>()
            .AddSignInManager();
        services.Configure<PasswordHasherOptions>(o => o.IterationCount = HashingRounds);
        services.AddAuthentication(EitherScheme)
            .AddPolicyScheme(EitherScheme, null, o => o.ForwardDefaultSelector = context =>
                context.Request.Headers.Authorization.Count > 0 ? ApiTokenHandler.SchemeName : IdentityConstants.ApplicationScheme)
            .AddScheme<ApiTokenOptions, ApiTokenHandler>(ApiTokenHandler.SchemeName, null)
            .AddCookie(IdentityConstants.ApplicationScheme, o => SessionCookie.Configure(o, settings.SignIn));
        services.AddOptions<CookieAuthenticationOptions>(IdentityConstants.ApplicationScheme).Configure<TimeProvider>((o, clock) => o.TimeProvider = clock);
        services.AddAuthorization();
        services.AddSingleton<PasswordRules>();
        services.AddSingleton<SignInAttempts>();
        services.AddScoped<SignInDesk>();
        services.AddRateLimiter(limiter =>
        {
            limiter.AddPolicy(SignInEndpoints.AttemptsPolicy, context => RateLimitPartition.GetFixedWindowLimiter(
                CallerAddress.Of(context),
                _ => new FixedWindowRateLimiterOptions { PermitLimit = settings.SignIn.AttemptsPerMinute, Window = TimeSpan.FromMinutes(1) }));
            limiter.OnRejected = (context, _) =>
            {
                context.HttpContext.Response.Headers.RetryAfter = "60";
                return new ValueTask(Problems.WriteAsync(
                    context.HttpContext, StatusCodes.Status429TooManyRequests, "tooMany", "There were too many attempts from your address in the last minute. Wait a minute."));
            };
        });
    }

    /// <summary>
    /// Where the keys of sessions lie. The framework asks for them before the store has started, and would make the folders of data
    /// and keys for all to look into: they are made here as the store makes them.
    /// </summary>
    private static FileSystemXmlRepository SessionKeys(StorageSettings storage, ILoggerFactory log)
    {
        var folder = Path.Combine(storage.KeysFolder, "sessions");
        try
        {
            PrivateFiles.MakeFolder(storage.DataFolder);
            PrivateFiles.MakeFolder(storage.KeysFolder);
            PrivateFiles.MakeFolder(folder);
        }
        catch (Exception e) when (e is UnauthorizedAccessException or IOException)
        {
            throw new StoreSettingsException(
                $"The folders of data and keys, {storage.DataFolder} and {storage.KeysFolder}, cannot be made or written to: {e.Message} Give this account the right to write there, or name other folders (ModelLab:DataFolder, ModelLab:KeysFolder).");
        }

        return new FileSystemXmlRepository(new DirectoryInfo(folder), log);
    }
}
