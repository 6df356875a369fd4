using System.Reflection;
using System.Reflection.Metadata;
using System.Reflection.PortableExecutable;
using System.Text.Json;
using ModelLab.Statistics.Catalogue;
using ModelLab.Statistics.Description;
using ModelLab.Statistics.Inference;

namespace ModelLab.Statistics.Tests.Catalogue;

public class StatisticsCatalogueTests
{
    // Properties that name what is described, or say yes or no, rather than measure it.
    private static readonly string[] NotStatistics = ["CategoryIndex", "Index"];

    private static readonly Dictionary<Type, StatisticSubject> Records = new()
    {
        [typeof(CoefficientResult)] = StatisticSubject.Coefficient,
        [typeof(TermResult)] = StatisticSubject.Term,
        [typeof(TermLoss)] = StatisticSubject.Loss,
        [typeof(FitSummary)] = StatisticSubject.Fit,
        [typeof(VarianceLine)] = StatisticSubject.Variance,
        [typeof(RowResults)] = StatisticSubject.Row,
        [typeof(NumberDescription)] = StatisticSubject.Number,
        [typeof(CategoryDescription)] = StatisticSubject.Category,
        [typeof(CategoryCount)] = StatisticSubject.Category,
        [typeof(Correlation)] = StatisticSubject.Correlation,
    };

    [Fact]
    public void Every_figure_of_the_result_records_is_in_the_catalogue()
    {
        var missing = Figures()
            .Where(figure => StatisticsCatalogue.Find(figure.Subject, figure.Key) is null)
            .Select(figure => $"{figure.Property.DeclaringType!.Name}.{figure.Property.Name} ({figure.Subject}, {figure.Key})");
        Assert.Empty(missing);
    }

    [Fact]
    public void Every_entry_belongs_to_a_figure()
    {
        var figures = Figures().Select(figure => (figure.Subject, figure.Key)).ToHashSet();
        Assert.Empty(StatisticsCatalogue.All.Where(entry => !figures.Contains((entry.Subject, entry.Key))).Select(Describe));
    }

    [Fact]
    public void Every_record_of_figures_is_looked_at()
    {
        // a new public record with numbers in Inference or Description must be entered above
        var forgotten = typeof(FitSummary).Assembly.GetExportedTypes()
            .Where(type => type.Namespace is "ModelLab.Statistics.Inference" or "ModelLab.Statistics.Description")
            .Where(type => type != typeof(FitOptions) && !Records.ContainsKey(type))
            .Where(type => type.GetMethod("<Clone>$") is not null && type.GetProperties().Any(IsFigure))
            .Select(type => type.Name);
        Assert.Empty(forgotten);
    }

    [Fact]
    public void Entries_say_what_they_are()
    {
        foreach (var entry in StatisticsCatalogue.All)
        {
            Assert.False(string.IsNullOrWhiteSpace(entry.Name), Describe(entry));
            Assert.EndsWith(".", entry.Definition, StringComparison.Ordinal);
            Assert.DoesNotContain('\n', entry.Definition);
            Assert.True(
                entry.Source == "common practice" || entry.Source.Split("; ").All(source => source.Any(char.IsDigit)),
                $"{Describe(entry)}: '{entry.Source}' names no year");
        }
    }

    [Fact]
    public void An_unknown_key_has_no_entry()
    {
        Assert.Null(StatisticsCatalogue.Find(StatisticSubject.Fit, "vif"));
        Assert.Equal("R²", StatisticsCatalogue.Find(StatisticSubject.Fit, "rSquared")!.Symbol);
    }

    [Fact]
    public void Every_figure_is_read_by_some_test()
    {
        var read = PropertiesReadByTests();
        var unread = Figures()
            .Select(figure => $"{figure.Property.DeclaringType!.Name}.{figure.Property.Name}")
            .Where(name => !read.Contains(name));
        Assert.True(!unread.Any(), $"read by no test: {string.Join(", ", unread)}");
    }

    [Fact]
    public void A_property_that_no_test_reads_would_be_seen()
    {
        // read above, so it is found; the contract of a record that is never read is not
        Assert.Contains("Statistic.Symbol", PropertiesReadByTests());
        Assert.DoesNotContain("CorrelationFigures.R", PropertiesReadByTests());
    }

    private static IEnumerable<(StatisticSubject Subject, string Key, PropertyInfo Property)> Figures() =>
        from record in Records
        from property in record.Key.GetProperties()
        where IsFigure(property)
        select (record.Value, JsonNamingPolicy.CamelCase.ConvertName(property.Name), property);

    private static bool IsFigure(PropertyInfo property)
    {
        var type = property.PropertyType.IsArray ? property.PropertyType.GetElementType()! : property.PropertyType;
        type = Nullable.GetUnderlyingType(type) ?? type;
        return (type == typeof(double) || type == typeof(int)) && !NotStatistics.Contains(property.Name);
    }

    // The getters of other assemblies that the compiled tests call, from the table of member references.
    private static HashSet<string> PropertiesReadByTests()
    {
        using var file = new PEReader(File.OpenRead(typeof(StatisticsCatalogueTests).Assembly.Location));
        var metadata = file.GetMetadataReader();
        var names = new HashSet<string>(StringComparer.Ordinal);
        foreach (var handle in metadata.MemberReferences)
        {
            var member = metadata.GetMemberReference(handle);
            var name = metadata.GetString(member.Name);
            if (member.Parent.Kind == HandleKind.TypeReference && name.StartsWith("get_", StringComparison.Ordinal))
            {
                var type = metadata.GetTypeReference((TypeReferenceHandle)member.Parent);
                names.Add($"{metadata.GetString(type.Name)}.{name[4..]}");
            }
        }

        return names;
    }

    private static string Describe(Statistic entry) => $"{entry.Subject}, {entry.Key}";
}
