namespace ModelLab.Architecture.Tests.Specimens.Common;

/// <summary>Named so that it breaks the rule of names twice, on purpose.</summary>
public static class TextHelper
{
    /// <summary>A name that only seems to break it: "Commonality" is one word.</summary>
    public static class CommonalityAnalysis
    {
    }
}
