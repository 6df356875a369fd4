using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;
using ModelLab.Architecture.Tests.Specimens.Common;

namespace ModelLab.Architecture.Tests;

public sealed class NamingTests
{
    [Fact]
    public void No_type_or_namespace_is_named_after_nothing()
    {
        var offenders = Rooms.Standing.SelectMany(room =>
        {
            using var assembly = Rooms.Open(room);
            return NamingRule.Violations(assembly.MainModule.GetTypes()).ToList();
        });
        Offenders.None("A name says what a type is about.", offenders);
    }

    [Fact]
    public void Violation_both_the_type_and_the_namespace_are_found() => Assert.Equal(
        ["ModelLab.Architecture.Tests.Specimens.Common.TextHelper is named Common", "ModelLab.Architecture.Tests.Specimens.Common.TextHelper is named Helper"],
        NamingRule.Violations([Specimen.Of(typeof(TextHelper))]));

    [Fact]
    public void A_word_that_only_begins_alike_is_left_alone() =>
        Assert.DoesNotContain(NamingRule.Violations([Specimen.Of(typeof(TextHelper.CommonalityAnalysis))]), o => o.Contains("named Commonality", StringComparison.Ordinal));
}
