using ModelLab.Projects;
using ModelLab.Web.Features.SignIn;
using ModelLab.Web.Settings;
using Xunit;

namespace ModelLab.Web.Tests.Features.SignIn;

public sealed class PasswordRulesTests
{
    private readonly PasswordRules rules = new(new SignInSettings());

    [Theory]
    [InlineData("elevenchars")]
    [InlineData("aaaaaaaaaaaaaaaa")]
    [InlineData("abababababababab")]
    [InlineData("abcdefghijklmnop")]
    [InlineData("987654321098")]
    [InlineData("Margarethe1950")]
    [InlineData("margarethe.hill")]
    [InlineData("ModelLab12345")]
    public void What_is_easy_to_guess_is_refused(string password)
    {
        var refused = Assert.Throws<RefusedException>(() => rules.Check(password, "Margarethe Hill", "margarethe.hill@example.org"));
        Assert.Equal(RefusalKind.Invalid, refused.Kind);
        Assert.Equal("password", Assert.Single(refused.Details).Column);
        Assert.DoesNotContain(password, refused.Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("quiet lantern over the weir")]
    [InlineData("no capitals no digits")]
    [InlineData("пароль из многих слов")]
    [InlineData("Hill walking in November")]
    public void Long_words_do_without_rules_of_composition(string password) => rules.Check(password, "Margarethe Hill", "margarethe.hill@example.org");

    [Fact]
    public void A_password_without_end_is_refused() =>
        Assert.Throws<RefusedException>(() => rules.Check(string.Concat(Enumerable.Range(0, 100).Select(i => $"word{i} ")), "A", "a@example.org"));
}
