namespace ModelLab.Intake.Csv.Profiling;

/// <summary>Counts cells written as calendar dates, and what speaks for day before month or month before day.</summary>
internal sealed class DateTally
{
    /// <summary>Dates in the form of ISO 8601, YYYY-MM-DD, also with a time of day behind.</summary>
    internal long Iso { get; private set; }

    /// <summary>Dates in three parts with the year last (or in two digits), such as 03/04/2024.</summary>
    internal long YearLast { get; private set; }

    /// <summary>Whole numbers that read as YYYYMMDD.</summary>
    internal long Compact { get; private set; }

    /// <summary>Whether a first part above 12 was met: the day stands first.</summary>
    internal bool DayFirst { get; private set; }

    /// <summary>Whether a second part above 12 was met: the month stands first.</summary>
    internal bool MonthFirst { get; private set; }

    /// <summary>Earliest year, 0 where there is none.</summary>
    internal int FirstYear { get; private set; }

    /// <summary>Latest year.</summary>
    internal int LastYear { get; private set; }

    /// <summary>Looks at a trimmed cell.</summary>
    internal void Add(ReadOnlySpan<byte> text)
    {
        if (text.Length is < 6 or > 35 || !char.IsAsciiDigit((char)text[0]))
        {
            return;
        }

        if (text.Length == 8 && Number(text[..4]) is var compactYear and >= 1800 and <= 2100
            && Number(text[4..6]) is var compactMonth && Number(text[6..]) is var compactDay && IsDay(compactYear, compactMonth, compactDay))
        {
            Compact++;
            See(compactYear);
            return;
        }

        if (text.Length >= 10 && text[4] == '-' && text[7] == '-')
        {
            if (Number(text[..4]) is var year and > 0 && IsDay(year, Number(text[5..7]), Number(text[8..10]))
                && (text.Length == 10 || text[10] is (byte)'T' or (byte)' '))
            {
                Iso++;
                See(year);
            }

            return;
        }

        AddYearLast(text);
    }

    private void AddYearLast(ReadOnlySpan<byte> text)
    {
        var first = text.IndexOfAny((byte)'/', (byte)'.', (byte)'-');
        if (first is < 1 or > 2)
        {
            return;
        }

        var rest = text[(first + 1)..];
        var second = rest.IndexOf(text[first]);
        if (second is < 1 or > 2)
        {
            return;
        }

        var a = Number(text[..first]);
        var b = Number(rest[..second]);
        var yearText = rest[(second + 1)..];
        var blank = yearText.IndexOf((byte)' ');
        yearText = blank < 0 ? yearText : yearText[..blank];
        var year = Number(yearText);
        if (yearText.Length is not (2 or 4) || year < 0)
        {
            return;
        }

        year = yearText.Length == 4 ? year : 2000;
        if (!IsDay(year, a, b) && !IsDay(year, b, a))
        {
            return;
        }

        YearLast++;
        DayFirst |= a > 12;
        MonthFirst |= b > 12;
        if (yearText.Length == 4)
        {
            See(year);
        }
    }

    private void See(int year)
    {
        FirstYear = FirstYear == 0 ? year : Math.Min(FirstYear, year);
        LastYear = Math.Max(LastYear, year);
    }

    private static bool IsDay(int year, int month, int day) =>
        year is >= 1 and <= 9999 && month is >= 1 and <= 12 && day >= 1 && day <= DateTime.DaysInMonth(year, month);

    private static int Number(ReadOnlySpan<byte> digits)
    {
        var value = 0;
        foreach (var digit in digits)
        {
            if (!char.IsAsciiDigit((char)digit))
            {
                return -1;
            }

            value = (value * 10) + (digit - '0');
        }

        return digits.Length is 0 or > 4 ? -1 : value;
    }
}
