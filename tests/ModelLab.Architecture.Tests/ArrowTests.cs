using ModelLab.Architecture.Tests.Reading;
using ModelLab.Architecture.Tests.Rules;
using ModelLab.Architecture.Tests.Specimens;
using Mono.Cecil;
using Mono.Cecil.Cil;

namespace ModelLab.Architecture.Tests;

public sealed class ArrowTests
{
    public static TheoryData<string> StandingRooms => [.. Rooms.Standing];

    [Fact]
    public void The_house_has_the_rooms_that_it_should_have()
    {
        Assert.Superset(
            new HashSet<string> { "ModelLab.Statistics", "ModelLab.Ledger", "ModelLab.Intake", "ModelLab.Projects", "ModelLab.Store", "ModelLab.Store.Sqlite", "ModelLab.Web" },
            Rooms.Standing.ToHashSet());
        Offenders.None("Every project under src/ is a room of the house.", ArrowRule.UnknownRooms(Rooms.Standing));
    }

    [Theory]
    [MemberData(nameof(StandingRooms))]
    public void A_room_looks_only_where_it_may(string room)
    {
        var allowed = Rooms.Allowed[room];
        using var assembly = Rooms.Open(room);
        var project = RepositoryTree.Read($"src/{room}/{room}.csproj").Text;
        Offenders.None(
            $"{room} may look into {(allowed.Count == 0 ? "no other room" : string.Join(", ", allowed))}.",
            ArrowRule.InProjectFile(room, project, allowed).Concat(ArrowRule.InReferences(assembly, allowed)).Concat(ArrowRule.InTypes(assembly, allowed)));
    }

    [Fact]
    public void The_arrows_have_no_circle()
    {
        foreach (var room in Rooms.Allowed.Keys)
        {
            var reached = new HashSet<string>();
            var open = new Stack<string>(Rooms.Allowed[room]);
            while (open.TryPop(out var next))
            {
                if (reached.Add(next))
                {
                    foreach (var further in Rooms.Allowed[next])
                    {
                        open.Push(further);
                    }
                }
            }

            Assert.DoesNotContain(room, reached);
        }
    }

    [Fact]
    public void Violation_a_room_that_nobody_planned_is_found() =>
        Assert.Equal(["ModelLab.Cellar is no room of the house"], ArrowRule.UnknownRooms(["ModelLab.Ledger", "ModelLab.Cellar"]));

    [Fact]
    public void Violation_a_project_file_that_points_back_is_found() => Assert.Equal(
        ["ModelLab.Ledger.csproj refers to ModelLab.Projects", "ModelLab.Ledger.csproj refers to ModelLab.Store"],
        ArrowRule.InProjectFile(
            "ModelLab.Ledger",
            """
            <Project>
              <ItemGroup><ProjectReference Include="../ModelLab.Projects/ModelLab.Projects.csproj" /></ItemGroup>
              <ItemGroup><ProjectReference Include="..\ModelLab.Store\ModelLab.Store.csproj" /><ProjectReference Include="../ModelLab.Statistics/ModelLab.Statistics.csproj" /></ItemGroup>
            </Project>
            """,
            new HashSet<string> { "ModelLab.Statistics" }));

    [Fact]
    public void Violation_a_compiled_reference_back_is_found_with_its_place()
    {
        using var statistics = StatisticsThatAsksTheLedger();
        Assert.Equal(["ModelLab.Statistics refers to ModelLab.Ledger"], ArrowRule.InReferences(statistics, Rooms.Allowed["ModelLab.Statistics"]));
        Assert.Equal(
            ["ModelLab.Statistics.Designs.Column.Ask uses ModelLab.Ledger.Entries.Chain of ModelLab.Ledger"],
            ArrowRule.InTypes(statistics, Rooms.Allowed["ModelLab.Statistics"]));
        Assert.Empty(ArrowRule.InTypes(statistics, Rooms.Allowed["ModelLab.Projects"]));
    }

    [Fact]
    public void Violation_an_existing_look_is_found_where_the_rule_forbids_it()
    {
        using var intake = Rooms.Open("ModelLab.Intake");
        var offenders = ArrowRule.InTypes(intake, new HashSet<string>()).ToList();
        Assert.Contains(offenders, o => o.StartsWith("ModelLab.Intake.Csv.CsvTable", StringComparison.Ordinal) && o.EndsWith("uses ModelLab.Statistics.Designs.DataTable of ModelLab.Statistics", StringComparison.Ordinal));
        Assert.Equal(["ModelLab.Intake refers to ModelLab.Statistics"], ArrowRule.InReferences(intake, new HashSet<string>()));
    }

    [Fact]
    public void A_use_is_seen_in_bases_fields_signatures_and_bodies()
    {
        var places = TypeUses.OfType(Specimen.Of(typeof(OutsideUse))).Where(u => u.Assembly == "ModelLab.Ledger").Select(u => u.Place[typeof(OutsideUse).FullName!.Length..]);
        Assert.Equal(["", ".Equals", ".InBody", ".InSignature", ".Set", ".inField"], places.Distinct().Order(StringComparer.Ordinal));
    }

    // An assembly of the name ModelLab.Statistics, made here, whose one method calls a method of the ledger.
    private static AssemblyDefinition StatisticsThatAsksTheLedger()
    {
        var assembly = AssemblyDefinition.CreateAssembly(new AssemblyNameDefinition("ModelLab.Statistics", new Version(1, 0)), "ModelLab.Statistics", ModuleKind.Dll);
        var module = assembly.MainModule;
        var ledger = new AssemblyNameReference("ModelLab.Ledger", new Version(1, 0));
        module.AssemblyReferences.Add(ledger);
        var chain = new TypeReference("ModelLab.Ledger.Entries", "Chain", module, ledger);
        var method = new MethodDefinition("Ask", MethodAttributes.Public | MethodAttributes.Static, module.TypeSystem.Void);
        var body = method.Body.GetILProcessor();
        body.Emit(OpCodes.Call, new MethodReference("Append", module.TypeSystem.Void, chain));
        body.Emit(OpCodes.Ret);
        var type = new TypeDefinition("ModelLab.Statistics.Designs", "Column", TypeAttributes.Public | TypeAttributes.Class, module.TypeSystem.Object);
        type.Methods.Add(method);
        module.Types.Add(type);
        return assembly;
    }
}
