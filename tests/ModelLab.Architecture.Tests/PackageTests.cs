using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;

namespace ModelLab.Architecture.Tests;

public sealed class PackageTests
{
    private static readonly Dictionary<string, string> SomeCentral = new() { ["Solver"] = "2.0.0", ["Reader"] = "1.5.0" };

    private static IReadOnlyDictionary<string, string> Central => PackageRule.CentralVersions(RepositoryTree.Read("Directory.Packages.props").Text);

    [Fact]
    public void Versions_stand_in_one_place()
    {
        Assert.NotEmpty(Central);
        Offenders.None("Package versions stand in Directory.Packages.props alone.", RepositoryTree.Projects(string.Empty).SelectMany(p => PackageRule.OwnVersions(p.Path, p.Text, Central)));
    }

    [Fact]
    public void Every_project_has_locked_what_it_restores()
    {
        Offenders.None("Every project has a lock file that holds its packages at the central versions.", RepositoryTree.Projects(string.Empty).SelectMany(p =>
        {
            var beside = Path.GetDirectoryName(p.Path)!.Replace('\\', '/') + "/packages.lock.json";
            return PackageRule.LockFile(p.Path, p.Text, RepositoryTree.Files.Contains(beside) ? RepositoryTree.Read(beside).Text : null, Central);
        }));
    }

    [Fact]
    public void Every_project_is_part_of_the_solution() =>
        Offenders.None("Every project is built and tested.", PackageRule.OutsideSolution(RepositoryTree.Projects(string.Empty).Select(p => p.Path), RepositoryTree.Read("ModelLab.sln").Text));

    [Fact]
    public void Violation_a_version_of_its_own_and_a_package_without_a_central_one_are_found() => Assert.Equal(
        ["a.csproj gives Solver a version of its own", "a.csproj gives Reader a version of its own", "a.csproj refers to Stranger, which has no central version"],
        PackageRule.OwnVersions(
            "a.csproj",
            """
            <Project><ItemGroup>
              <PackageReference Include="Solver" Version="2.0.0" /><PackageReference Include="Reader"><VersionOverride>1.4.0</VersionOverride></PackageReference>
              <PackageReference Include="Stranger" />
            </ItemGroup></Project>
            """,
            SomeCentral));

    [Fact]
    public void Violation_a_missing_or_outdated_lock_file_is_found()
    {
        const string Project = "<Project><ItemGroup><PackageReference Include=\"Solver\" /><PackageReference Include=\"Reader\" /></ItemGroup></Project>";
        const string Lock = """{"version": 2, "dependencies": {"net10.0": {"Solver": {"type": "Direct", "resolved": "1.9.0"}, "Reader": {"type": "Transitive", "resolved": "1.5.0"}}}}""";
        Assert.Equal(["a.csproj has no packages.lock.json beside it"], PackageRule.LockFile("a.csproj", Project, null, SomeCentral));
        Assert.Equal(
            ["a.csproj has locked Solver 1.9.0 where 2.0.0 is central", "a.csproj refers to Reader, which its lock file does not hold"],
            PackageRule.LockFile("a.csproj", Project, Lock, SomeCentral));
    }

    [Fact]
    public void Violation_a_project_outside_the_solution_is_found() => Assert.Equal(
        ["tests/New.Tests/New.Tests.csproj is not part of the solution"],
        PackageRule.OutsideSolution(["src/Old/Old.csproj", "tests/New.Tests/New.Tests.csproj"], "Project(\"{X}\") = \"Old\", \"src\\Old\\Old.csproj\", \"{Y}\""));
}
