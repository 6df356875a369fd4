namespace ModelLab.Ledger.Tests.Tampering;

/// <summary>Counts what was tried and keeps what went wrong, so that one run lists all offenders.</summary>
internal sealed class Tally(string family)
{
    private readonly List<string> wrong = [];

    public string Family => family;

    public int Valid { get; private set; }

    public int Tampered { get; private set; }

    public IReadOnlyList<string> Wrong => wrong;

    /// <summary>Something untouched, which must pass.</summary>
    public void MustPass(bool passed, string what)
    {
        Valid++;
        Note(passed, $"{family}: untouched {what} did not pass");
    }

    /// <summary>Something tampered with, which must be found.</summary>
    public void MustBeFound(bool found, string what)
    {
        Tampered++;
        Note(found, $"{family}: {what} was not found");
    }

    private void Note(bool right, string fault)
    {
        if (!right)
        {
            wrong.Add(fault);
        }
    }
}
