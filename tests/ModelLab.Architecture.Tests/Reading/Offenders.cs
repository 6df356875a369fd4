namespace ModelLab.Architecture.Tests.Reading;

/// <summary>Fails a test with every offender, not only the first.</summary>
public static class Offenders
{
    /// <summary>Asserts that a rule found nothing.</summary>
    public static void None(string rule, IEnumerable<string> offenders)
    {
        var list = offenders.Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal).ToList();
        Assert.True(list.Count == 0, $"{rule}\n{list.Count} offender(s):\n  " + string.Join("\n  ", list));
    }
}
