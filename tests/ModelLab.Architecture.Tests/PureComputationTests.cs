using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;
using ModelLab.Architecture.Tests.Specimens;

namespace ModelLab.Architecture.Tests;

public sealed class PureComputationTests
{
    [Fact]
    public void Statistics_only_computes()
    {
        using var statistics = Rooms.Open("ModelLab.Statistics");
        Offenders.None("Statistics uses no files, network, storage, JSON, clock or ambient randomness.", PureComputationRule.Violations(TypeUses.Of(statistics)));
    }

    [Fact]
    public void Violation_each_way_of_reaching_outside_is_found()
    {
        var offenders = PureComputationRule.Violations(TypeUses.OfType(Specimen.Of(typeof(ImpureComputation)))).ToList();
        var places = offenders.Select(o => o.Split(' ')[0].Split('.')[^1]).Distinct().Order(StringComparer.Ordinal);
        Assert.Equal(["CountsTicks", "Draws", "ReadsAFile", "Speaks", "TakesTheTime", "WatchesTheTime", "WritesJson", "ctor", "random"], places);
    }
}
