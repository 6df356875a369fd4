namespace ModelLab.Projects.Tests;

public sealed class ReasonsTests
{
    [Theory]
    [InlineData(null)]
    [InlineData(" ")]
    [InlineData(" \u200b ")]
    [InlineData("\u2060\ufeff")]
    public void A_reason_that_shows_nothing_is_none(string? reason) =>
        Assert.StartsWith("Say why", Assert.Throws<RefusedException>(() => Reasons.Require(reason)).Message, StringComparison.Ordinal);

    [Theory]
    [InlineData("\u202ednuor eht yaw rehto eht")]
    [InlineData("a\u2066b")]
    public void A_name_does_not_turn_the_text_around_it(string name) =>
        Assert.Contains("turns the direction", Assert.Throws<RefusedException>(() => Reasons.Name(name, "name")).Message, StringComparison.Ordinal);

    [Theory]
    [InlineData("Zo\u00eb")]
    [InlineData("\u05e9\u05dc\u05d5\u05dd")]
    [InlineData("\U0001F40C")]
    public void A_name_may_be_of_any_script(string name) => Assert.Equal(name, Reasons.Name(name, "name"));
}
