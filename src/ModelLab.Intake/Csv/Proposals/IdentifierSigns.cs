using System.Text;
using System.Text.RegularExpressions;
using ModelLab.Intake.Csv.Reading;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Counts, among the distinct values of a column, those written like direct identifiers of people. The patterns are common practice:
/// they find the usual forms and are wrong at times, which is why they lead to a question only.
/// </summary>
internal sealed partial class IdentifierSigns
{
    private const int LongestText = 200;
    private const int LongestPlainNumber = 8;

    /// <summary>Values looked at.</summary>
    internal long Seen { get; private set; }

    /// <summary>Values that contain an e-mail address.</summary>
    internal long EMail { get; private set; }

    /// <summary>Values written like a telephone number.</summary>
    internal long Telephone { get; private set; }

    /// <summary>Values written like a national, insurance or bank account number.</summary>
    internal long National { get; private set; }

    /// <summary>Values written like a person's name, given name and surname.</summary>
    internal long PersonName { get; private set; }

    /// <summary>Values written like a street and house number.</summary>
    internal long PostalAddress { get; private set; }

    /// <summary>Looks at a value met for the first time.</summary>
    internal void Add(ReadOnlySpan<byte> text, NumberForm form)
    {
        Seen++;
        var isNumber = form is NumberForm.Plain or NumberForm.Point or NumberForm.Comma;
        if (text.Length < 5 || (isNumber && (text.Length <= LongestPlainNumber || form != NumberForm.Plain || text[0] is not ((byte)'0' or (byte)'+'))))
        {
            return;
        }

        var value = Encoding.UTF8.GetString(text[..Math.Min(text.Length, LongestText)]);
        if (value.Contains('@', StringComparison.Ordinal) && EMailPattern().IsMatch(value))
        {
            EMail++;
        }
        else if (NationalPattern().IsMatch(value))
        {
            National++;
        }
        else if (TelephonePattern().IsMatch(value) && value.Count(char.IsAsciiDigit) is >= 7 and <= 15)
        {
            Telephone++;
        }
        else if (PersonNamePattern().IsMatch(value))
        {
            PersonName++;
        }
        else if (value.Any(char.IsAsciiDigit) && AddressPattern().IsMatch(value))
        {
            PostalAddress++;
        }
    }

    [GeneratedRegex(@"[\p{L}\p{N}._%+-]{1,64}@[\p{L}\p{N}-]{1,63}(\.[\p{L}\p{N}-]{1,63})+", RegexOptions.CultureInvariant)]
    private static partial Regex EMailPattern();

    // international or trunk prefix, then digits in groups
    [GeneratedRegex(@"^(\+|00|0|\(0|\(\+?[0-9]{2,5}\))[0-9 ()./-]{5,22}$", RegexOptions.CultureInvariant)]
    private static partial Regex TelephonePattern();

    // 123-45-6789 (United States), AB123456C (United Kingdom), 010190-1234 or 010190+1234 (Nordic), IBAN (ISO 13616)
    [GeneratedRegex(@"^([0-9]{3}-[0-9]{2}-[0-9]{4}|[A-CEGHJ-PR-TW-Z]{2} ?[0-9]{2} ?[0-9]{2} ?[0-9]{2} ?[A-D]|[0-9]{6,8}[-+A][0-9]{3}[0-9A-Z]|[A-Z]{2}[0-9]{2}( ?[A-Z0-9]{4}){3,7} ?[A-Z0-9]{0,3})$", RegexOptions.CultureInvariant)]
    private static partial Regex NationalPattern();

    [GeneratedRegex(@"^((Dr|Mr|Mrs|Ms|Prof)\.? )?\p{Lu}[\p{Ll}'’-]+(\p{Lu}\p{Ll}+)?( \p{Lu}\.?| (de|van|von|da|di|la|den|der|al))*,? \p{Lu}['’]?[\p{L}'’-]+$", RegexOptions.CultureInvariant)]
    private static partial Regex PersonNamePattern();

    [GeneratedRegex(@"(\b(street|st|road|rd|avenue|ave|lane|ln|drive|close|crescent|court|square|terrace|rue|via|calle|rua|plaza|platz|weg|allee|p\.? ?o\.? box)\b|(stra(ß|ss)e|str\.|gasse|straat|gatan|vej)(\b|\s))", RegexOptions.CultureInvariant | RegexOptions.IgnoreCase)]
    private static partial Regex AddressPattern();
}
