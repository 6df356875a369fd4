using System.Text;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>The words of a column's name in lower case, cut at signs, between letters and digits, and at capitals inside (<c>dateOfBirth</c>).</summary>
internal sealed class HeaderWords
{
    private readonly List<string> words = [];
    private readonly string joined;

    /// <summary>Cuts a name into words.</summary>
    internal HeaderWords(string name)
    {
        var word = new StringBuilder();
        for (var i = 0; i < name.Length; i++)
        {
            var c = name[i];
            var starts = i > 0 && ((char.IsUpper(c) && char.IsLower(name[i - 1])) || (char.IsDigit(c) != char.IsDigit(name[i - 1])));
            if ((starts || !char.IsLetterOrDigit(c)) && word.Length > 0)
            {
                words.Add(word.ToString());
                word.Clear();
            }

            if (char.IsLetterOrDigit(c))
            {
                word.Append(char.ToLowerInvariant(c));
            }
        }

        if (word.Length > 0)
        {
            words.Add(word.ToString());
        }

        joined = ' ' + string.Join(' ', words) + ' ';
    }

    /// <summary>How many words.</summary>
    internal int Count => words.Count;

    /// <summary>Whether one of the phrases (words with single spaces between) stands in the name.</summary>
    internal bool HasAny(IEnumerable<string> phrases) => phrases.Any(p => joined.Contains($" {p} ", StringComparison.Ordinal));

    /// <summary>Whether the name is one of the phrases and nothing else.</summary>
    internal bool IsAny(IEnumerable<string> phrases) => phrases.Contains(joined.Trim(), StringComparer.Ordinal);
}
