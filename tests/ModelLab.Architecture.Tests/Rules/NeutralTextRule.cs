using System.Text.RegularExpressions;
using ModelLab.Architecture.Tests.Reading;

namespace ModelLab.Architecture.Tests.Rules;

/// <summary>The tree builds anywhere: no text names the host of a package registry or a folder of one particular machine.</summary>
public static partial class NeutralTextRule
{
    // Written in two parts, so that this file does not break its own rule.
    private static readonly string[] Hosts =
    [
        "nuget" + ".org", "npmjs" + ".org", "npmjs" + ".com", "pypi" + ".org", "pythonhosted" + ".org", "crates" + ".io", "golang" + ".org",
        "rubygems" + ".org", "repo.maven" + ".apache", "yarnpkg" + ".com", "jsdelivr" + ".net", "unpkg" + ".com", "cdnjs" + ".cloudflare",
    ];

    /// <summary>Lines that name such a host or folder.</summary>
    public static IEnumerable<string> Violations(IEnumerable<TextFile> files)
    {
        foreach (var file in files)
        {
            var number = 0;
            foreach (var line in file.Lines)
            {
                number++;
                foreach (var host in Hosts.Where(h => line.Contains(h, StringComparison.OrdinalIgnoreCase)))
                {
                    yield return $"{file.Path}({number}) names {host}";
                }

                foreach (Match folder in MachineFolder().Matches(line))
                {
                    yield return $"{file.Path}({number}) names the folder {folder.Value}";
                }
            }
        }
    }

    // An absolute path: the slash follows no letter, digit, dot or closing bracket (else it is part of an address or a relative path).
    [GeneratedRegex(@"(?<![\w.\-~)\]}>*$])/(work|tmp|root|home)/[\w.\-]+|\b[A-Z]:\\Users\\")]
    private static partial Regex MachineFolder();
}
