namespace ModelLab.Intake.Text;

/// <summary>The place where a text ends because its bytes make no sense.</summary>
/// <param name="Message">What is wrong and what to do.</param>
internal sealed record TextFault(string Message);
