namespace ModelLab.Intake.Tests.Csv.Proposals;

/// <summary>The values are invented or come from ranges reserved for examples (RFC 2606 names, Ofcom drama numbers, SSN area 000 and the prefixes GB, NK and ZZ are never issued).</summary>
public sealed class DirectIdentifiersTests
{
    [Theory]
    [InlineData("contact", "ann@example.org,bo@example.com,cy@example.net", "e-mail")]
    [InlineData("remark", "none,write to ann@example.org please,none,none", "e-mail")]
    [InlineData("reached_at", "020 7946 0018,0117 496 0123,0161 496 0999", "telephone")]
    [InlineData("reached_at", "+441632960001,+441632960002,+441632960003", "telephone")]
    [InlineData("reached_at", "07700900123,07700900456,07700900789", "telephone")]
    [InlineData("number", "000-12-3456,000-65-4321,000-11-1111", "national")]
    [InlineData("number", "GB123456A,NK123456B,ZZ 12 34 56 C", "national")]
    [InlineData("respondent", "Ann Smith,Bo O'Hara,Cy van Dyke", "names of people")]
    [InlineData("place", "12 Mill Lane,3 High Street,99 Station Road", "postal")]
    [InlineData("place", "Lindenstraße 5,Hauptstr. 12,Am Weg 3", "postal")]
    [InlineData("when", "1931-02-03,1964-05-06,1999-07-08", "birth")]
    [InlineData("Name", "x1,x2,x3", "names of people")]
    [InlineData("firstName", "Ann,Bo,Cy,Ann", "names of people")]
    [InlineData("patient-name", "p,q,r", "names of people")]
    [InlineData("E-Mail", "p,q,r", "e-mail")]
    [InlineData("mobile", "1,22,333", "telephone")]
    [InlineData("date_of_birth", "2001-01-02,2001-03-04,2001-05-06", "birth dates")]
    [InlineData("Geburtsdatum", "2001-01-02,2001-03-04,2001-05-06", "birth dates")]
    [InlineData("home_address", "p,q,r", "postal")]
    [InlineData("NHS number", "4,5,6", "national")]
    public void Are_questioned_by_header_or_content(string name, string cells, string what)
    {
        var profile = Fixture.Profile($"{name}\tn\n" + string.Concat(cells.Split(',').Select((c, i) => $"{c}\t{i * i}.5\n")));

        var question = profile.Columns[0].Questions[0];
        Assert.Equal("direct-identifier", question.Code);
        Assert.Contains(what, question.Message, StringComparison.Ordinal);
        Assert.Equal([profile.Columns[0]], profile.DirectIdentifiers);
        Assert.True(profile.Columns[0].ProposedKind is VariableKind.Identifier or VariableKind.Date);
    }

    [Theory]
    [InlineData("species_name", "Adelie,Gentoo,Adelie")]
    [InlineData("phone", "yes,no,yes,no")]
    [InlineData("mobile", "0,1,1,0")]
    [InlineData("telephones", "1,2,3,2,1,3")]
    [InlineData("region", "North West,South East,North West,South East,South West,North East,North West,South East,South East")]
    [InlineData("dwelling_id", "D0001,D0002,D0003")]
    [InlineData("saved_kwh", "2600.5,1150.25,10760")]
    [InlineData("floor_area_m2", "88,120,205")]
    [InlineData("when", "2024-02-03,2024-05-06,2024-07-08")]
    [InlineData("renamed", "1,5,7")]
    [InlineData("streetlights", "1,5,7")]
    [InlineData("range", "10-20,20-30,30-40")]
    public void Are_not_seen_where_none_are(string name, string cells) =>
        Assert.DoesNotContain("direct-identifier", Fixture.Codes(Fixture.Column(name, cells.Split(','))));

    [Fact]
    public void Telephone_numbers_in_groups_of_three_are_no_thousands() =>
        Assert.Contains("direct-identifier", Fixture.Codes(Fixture.Column("phone", ["555 123", "555 124", "555 125"])));
}
