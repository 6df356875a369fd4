using System.Text.Json;
using ModelLab.Intake;

namespace ModelLab.Projects.Replaying;

/// <summary>What a replay meets where something on record cannot be computed any more. It is told, and the replay goes on.</summary>
internal static class Unreadable
{
    /// <summary>
    /// Refusals; files that no longer read; a vault that finds its content damaged; a record that names what is not there.
    /// </summary>
    public static bool Is(Exception e) =>
        e is RefusedException or IntakeRefusedException or IOException or JsonException or FormatException
            or InvalidOperationException or KeyNotFoundException or NullReferenceException or ArgumentException;

    /// <summary>What to say of it.</summary>
    public static string Problem(Exception e) => e is RefusedException or IntakeRefusedException or IOException
        ? e.Message
        : $"The record contradicts itself: {e.Message}";
}
