using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;
using ModelLab.Architecture.Tests.Specimens;

namespace ModelLab.Architecture.Tests;

public sealed class NamedResultsTests
{
    public static TheoryData<string> StandingRooms => [.. Rooms.Standing];

    [Theory]
    [MemberData(nameof(StandingRooms))]
    public void What_a_public_member_takes_and_gives_has_names(string room)
    {
        using var assembly = Rooms.Open(room);
        Offenders.None($"{room} gives named records in public.", NamedResultsRule.Violations(assembly.MainModule.GetTypes()));
    }

    [Fact]
    public void Violation_each_nameless_form_is_found()
    {
        var offenders = NamedResultsRule.Violations([Specimen.Of(typeof(NamelessResults))]).Select(o => o[typeof(NamelessResults).FullName!.Length..]);
        Assert.Equal(
            [
                ".Anything has an array of objects in its signature",
                ".Inside has a tuple in its signature",
                ".Interval has a tuple in its signature",
                ".Table has an array of arrays in its signature",
                ".Takes has an array of several dimensions in its signature",
                ".get_Pair has a tuple in its signature",
            ],
            offenders.Order(StringComparer.Ordinal));
    }
}
