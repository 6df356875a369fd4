using System.Globalization;
using ModelLab.Web.Features.Demo.Data;
using Xunit;

namespace ModelLab.Web.Tests.Features.Demo;

public sealed class MarrowValeTests
{
    private static readonly IReadOnlyList<GrantRow> Rows = MarrowVale.Shipped();

    [Theory]
    [InlineData(DemoFiles.Damaged, false)]
    [InlineData(DemoFiles.Corrected, true)]
    public void The_shipped_table_is_what_the_generator_gives_byte_for_byte(string name, bool corrected)
    {
        var drawn = GrantsTable.Write(Rows, corrected);
        var shipped = DemoFiles.Text(name);
        if (drawn != shipped)
        {
            var beside = Path.Combine(AppContext.BaseDirectory, "drawn-" + name);
            File.WriteAllText(beside, drawn);
            Assert.Fail($"{name} differs from what the generator gives. If the generator was meant to change, take {beside} in its place.");
        }
    }

    [Fact]
    public void The_two_tables_differ_in_one_cell()
    {
        var damaged = DemoFiles.Text(DemoFiles.Damaged).Split('\n');
        var corrected = DemoFiles.Text(DemoFiles.Corrected).Split('\n');
        var line = Assert.Single(Enumerable.Range(0, corrected.Length), i => damaged[i] != corrected[i]);
        Assert.Equal(corrected[line].Replace(",94.0,", ",940,", StringComparison.Ordinal), damaged[line]);
        Assert.True(Rows[line - 1].Dwelling.Rooms <= 5);
    }

    [Fact]
    public void Missing_values_are_as_frequent_as_planned()
    {
        Assert.Equal(MarrowVale.Dwellings, Rows.Count);
        Assert.Equal(24, Rows.Count(r => r.SetpointMissing));
        Assert.Equal(37, Rows.Count(r => r.OccupantsMissing));
        Assert.Equal(563, Rows.Count(r => !r.OccupantsMissing));
    }

    [Fact]
    public void Those_whose_occupants_are_missing_saved_less() =>
        Assert.True(Rows.Where(r => r.OccupantsMissing).Average(r => r.Dwelling.SavedKwh) < Rows.Where(r => !r.OccupantsMissing).Average(r => r.Dwelling.SavedKwh) - 300);

    [Fact]
    public void The_farmhouse_is_about_two_of_its_own_deviations_away()
    {
        var farmhouse = Rows[MarrowVale.FarmhouseRow - 1].Dwelling;
        Assert.Equal(MarrowVale.Farmhouse, farmhouse);
        Assert.Equal(2.2, (farmhouse.SavedKwh - TrueModel.Mean(farmhouse)) / TrueModel.ErrorDeviation(farmhouse), 0.05);
    }

    [Fact]
    public void The_true_model_beside_the_data_states_the_effects_that_made_them()
    {
        var stated = File.ReadLines(Path.Combine(SourceFolder(), "marrow-vale-true-model.md"))
            .Where(l => l.StartsWith("| ", StringComparison.Ordinal) && !l.StartsWith("| variable", StringComparison.Ordinal))
            .Select(l => l.Split('|', StringSplitOptions.TrimEntries))
            .Select(c => new TrueEffect(c[1], c[2].Length == 0 ? null : c[2], double.Parse(c[3], CultureInfo.InvariantCulture)));
        Assert.Equal(TrueModel.Effects, stated);
    }

    // Worked by hand from the table of effects: 1900 + 1900 + 9 (100 − 88) + 300 − 380 + 100 (15 − 14) + 0.9 (2300 − 2250) − 90 (3 − 2)
    // − 600 (0.5) + 700 ln 2 + 1.7 (66 − 56) + 160, with 700 ln 2 = 485.203026; and 560 (28/14)^0.8 = 975.0166.
    [Fact]
    public void The_expected_saving_adds_up_by_hand()
    {
        var dwelling = new Dwelling(0, Measure.SolidWall, 100, 4, Heating.Oil, 2, 15, 2300, 3, 0.5, 20, 66, true, 5);
        Assert.Equal(4245.203026, TrueModel.Mean(dwelling), 1e-6);
        Assert.Equal(975.0166, TrueModel.ErrorDeviation(dwelling with { BaselineMwh = 28 }), 1e-3);
    }

    private static string SourceFolder()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder!.FullName, "ModelLab.sln")))
        {
            folder = folder.Parent;
        }

        return Path.Combine(folder.FullName, "src", "ModelLab.Web", "Features", "Demo", "Data");
    }
}
