using System.Buffers;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Recognises categories that seem to have an order: words of one usual scale, or bands of numbers. The order is never guessed; it is asked for.
/// The scales are common practice in questionnaires and registers.
/// </summary>
internal static class ScaleWords
{
    private const int FewestCategories = 3;

    private static readonly SearchValues<char> BandSigns = SearchValues.Create("<>+≤≥–");

    private static readonly string[][] Scales =
    [
        ["very low", "low", "medium low", "medium", "moderate", "medium high", "high", "very high", "middle", "average", "normal", "below average", "above average"],
        ["extra small", "very small", "small", "medium", "large", "very large", "extra large", "xs", "s", "m", "l", "xl", "xxl"],
        ["none", "minimal", "mild", "slight", "moderate", "severe", "very severe", "extreme"],
        ["never", "rarely", "seldom", "occasionally", "sometimes", "often", "usually", "frequently", "always", "daily", "weekly", "monthly", "yearly"],
        ["very bad", "very poor", "bad", "poor", "fair", "satisfactory", "good", "very good", "excellent", "outstanding"],
        ["strongly disagree", "disagree", "somewhat disagree", "neutral", "neither", "undecided", "neither agree nor disagree", "somewhat agree", "agree", "strongly agree"],
        ["very dissatisfied", "dissatisfied", "neutral", "satisfied", "very satisfied"],
        ["beginner", "novice", "intermediate", "advanced", "expert"],
        ["primary", "lower secondary", "secondary", "upper secondary", "tertiary", "higher", "no education"],
        ["first", "second", "third", "fourth", "fifth"],
        ["i", "ii", "iii", "iv", "v"],
        ["infant", "child", "young", "adolescent", "adult", "middle aged", "old", "elderly"],
        ["worse", "same", "unchanged", "better", "much worse", "much better"],
    ];

    /// <summary>Whether the categories look ordered.</summary>
    internal static bool LookOrdered(IReadOnlyList<string> categories)
    {
        if (categories.Count < FewestCategories)
        {
            return false;
        }

        var plain = categories.Select(Plain).ToArray();
        return Scales.Any(scale => plain.All(scale.Contains)) || plain.All(IsBand) || categories.All(StartsWithRank);
    }

    private static string Plain(string category) =>
        category.Trim().ToLowerInvariant().Replace('-', ' ').Replace('_', ' ');

    // 0 20, 21 40, <20, 60+, under 5, over 65, 5 to 9
    private static bool IsBand(string text)
    {
        var rest = text.Replace("under", "<", StringComparison.Ordinal).Replace("over", ">", StringComparison.Ordinal).Replace("to", " ", StringComparison.Ordinal);
        var hasDigit = rest.Any(char.IsAsciiDigit);
        return hasDigit && (rest.Contains(' ', StringComparison.Ordinal) || rest.AsSpan().ContainsAny(BandSigns))
            && rest.All(c => char.IsAsciiDigit(c) || " <>+≤≥–=.".Contains(c, StringComparison.Ordinal));
    }

    // 1 - low, 2: middle, 3) high
    private static bool StartsWithRank(string category)
    {
        var text = category.Trim();
        var digits = text.TakeWhile(char.IsAsciiDigit).Count();
        return digits is 1 or 2 && text.Length > digits + 1 && text[digits..].TrimStart() is { Length: > 1 } rest && "-:)=–".Contains(rest[0], StringComparison.Ordinal) && rest.Any(char.IsLetter);
    }
}
