using System.Globalization;

namespace ModelLab.Intake.Csv;

/// <summary>What is said of a cell that is too long.</summary>
internal static class CellTooLong
{
    /// <summary>The message.</summary>
    internal static string Message(int bytes) => string.Create(CultureInfo.InvariantCulture,
        $"The cell is {bytes} bytes long; at most {IntakeLimits.CellBytes} are read. Usually a quote was not closed; else leave the column of long texts out.");
}
