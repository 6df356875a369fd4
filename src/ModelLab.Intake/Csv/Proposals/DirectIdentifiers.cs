using ModelLab.Intake.Csv.Profiling;

namespace ModelLab.Intake.Csv.Proposals;

/// <summary>
/// Questions columns that seem to hold direct identifiers of people: by the words of the header, or by how the values are written
/// (shares below; common practice). A column of two values, or of few repeated numbers, is no identifier whatever its name says
/// (<c>phone</c>: yes or no).
/// </summary>
internal static class DirectIdentifiers
{
    private const double ShareOfPattern = 0.8;
    private const double ShareOfAddresses = 0.5;
    private const double ShareOfDistinctNames = 0.5;
    private const int FewValues = 10;
    private const int YearsThatBirthsSpan = 40;

    private static readonly string[] EMailWords = ["email", "e mail", "mail", "emailaddress"];
    private static readonly string[] TelephoneWords = ["phone", "telephone", "tel", "mobile", "cellphone", "phonenumber", "fax", "telefon", "handy", "telephone number", "whatsapp"];
    private static readonly string[] NameWords =
    [
        "surname", "firstname", "lastname", "fullname", "forename", "forenames", "first name", "last name", "given name", "family name", "middle name", "maiden name",
        "full name", "person name", "patient name", "client name", "customer name", "employee name", "student name", "pupil name", "teacher name", "respondent name",
        "participant name", "contact name", "user name", "username", "householder", "vorname", "nachname", "familienname", "prenom", "nom de famille", "apellido", "apellidos", "cognome",
    ];

    private static readonly string[] WholeNameWords = ["name", "names", "person", "nom", "nombre", "nome", "naam"];
    private static readonly string[] NationalWords =
    [
        "ssn", "social security", "national insurance", "nino", "nhs number", "nhs no", "national id", "nationalid", "national number", "passport", "tax id", "tax number", "driving licence",
        "drivers license", "driver license", "cpr", "bsn", "pesel", "mrn", "medical record", "iban", "account number", "bank account", "insurance number", "identity card", "personnummer",
    ];

    private static readonly string[] BirthWords = ["dob", "birthdate", "date of birth", "birth date", "birthday", "birth day", "dateofbirth", "geburtsdatum", "geburtstag", "date de naissance", "fecha de nacimiento"];
    private static readonly string[] AddressWords = ["address", "addr", "street", "home address", "postal address", "adresse", "strasse", "straße", "direccion", "indirizzo"];

    /// <summary>The question, or null.</summary>
    /// <param name="column">What was noted of the column.</param>
    /// <param name="numeric">Whether it is read as numbers.</param>
    internal static IntakeQuestion? Ask(ColumnTally column, bool numeric)
    {
        var what = ByContent(column, numeric) ?? ByHeader(column, numeric);
        return what is null ? null : new IntakeQuestion(
            "direct-identifier",
            $"This column seems to hold {what}, which identify people directly. Does the analysis need it? If not, remove it from the file before it is stored; if it stays, confirm that this has been checked.");
    }

    /// <summary>Whether the header names something that identifies a person, whatever the values.</summary>
    internal static bool NamedSo(string name)
    {
        var words = new HeaderWords(name);
        return What(words) is not null;
    }

    private static string? ByHeader(ColumnTally column, bool numeric)
    {
        var few = column.Distinct.Distinct <= FewValues && column.Distinct.AnyRepeated;
        if (column.Distinct.Distinct == 0 || (column.Distinct.Distinct <= 2 && column.Distinct.AnyRepeated) || (numeric && few))
        {
            return null;
        }

        return What(new HeaderWords(column.Name));
    }

    private static string? What(HeaderWords words) =>
        words.HasAny(EMailWords) ? "e-mail addresses"
        : words.HasAny(TelephoneWords) ? "telephone numbers"
        : words.HasAny(NationalWords) ? "national, insurance or account numbers"
        : words.HasAny(BirthWords) ? "birth dates"
        : words.HasAny(NameWords) || words.IsAny(WholeNameWords) ? "names of people"
        : words.HasAny(AddressWords) ? "postal addresses"
        : null;

    private static string? ByContent(ColumnTally column, bool numeric)
    {
        var signs = column.Signs;
        if (signs.EMail > 0)
        {
            return "e-mail addresses";
        }

        if (signs.Seen == 0 || column.Distinct.Distinct <= 1)
        {
            return null;
        }

        var seen = (double)signs.Seen;
        var dates = column.Dates.Iso + column.Dates.YearLast;
        if (dates == column.Present)
        {
            return column.Dates.LastYear - column.Dates.FirstYear >= YearsThatBirthsSpan
                ? "dates spread over decades, as birth dates are,"
                : null;
        }

        if (signs.National >= ShareOfPattern * seen)
        {
            return "national, insurance or account numbers";
        }

        if (signs.Telephone >= ShareOfPattern * seen)
        {
            return "telephone numbers";
        }

        if (numeric)
        {
            return null;
        }

        return signs.PersonName >= ShareOfPattern * seen && column.Distinct.Distinct >= ShareOfDistinctNames * Math.Min(column.Present, IntakeLimits.DistinctPerColumn) ? "names of people"
            : signs.PostalAddress >= ShareOfAddresses * seen ? "postal addresses"
            : null;
    }
}
