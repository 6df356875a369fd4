using CsCheck;
using ModelLab.Intake.Csv;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Whatever the bytes: a profile or a refusal with a message, nothing else.</summary>
public sealed class FuzzTests
{
    private const string Pieces = "a1.,;|\t\"\r\n -+eENA0é@";

    [Fact]
    public void Random_bytes_are_profiled_or_refused() =>
        FixedDraws.Each(Gen.Byte.Array[0, 300], 50, 5000, bytes => ProfiledOrRefused(bytes));

    [Fact]
    public void Random_texts_of_signs_that_matter_are_profiled_or_refused() =>
        FixedDraws.Each(Gen.String[Gen.Char[Pieces], 0, 120], 51, 5000, text => ProfiledOrRefused(Fixture.Utf8(text)));

    [Fact]
    public void A_good_file_with_one_byte_changed_is_profiled_or_refused()
    {
        var good = Fixture.Utf8("name;n;size\n\"é; x\";1;2,5\n\"say \"\"so\"\"\";2;3,5\nplain;3;NA\n");
        for (var i = 0; i < good.Length; i++)
        {
            for (var value = 0; value < 256; value++)
            {
                var bytes = (byte[])good.Clone();
                bytes[i] = (byte)value;
                ProfiledOrRefused(bytes);
            }
        }
    }

    [Fact]
    public void A_good_file_cut_anywhere_is_profiled_or_refused()
    {
        var good = File.ReadAllBytes(Fixture.Path("penguins.csv"));
        Assert.Equal(344, good.Length == 0 ? 0 : Fixture.Profile(good).Rows);
        for (var length = 0; length < good.Length; length += 7)
        {
            ProfiledOrRefused(good[..length]);
        }
    }

    [Fact]
    public void What_is_profiled_is_read_by_its_own_profile()
    {
        var profiled = 0;
        FixedDraws.Each(
            Gen.String[Gen.Char["a1.,;\"\n -NA"], 0, 60],
            52,
            20_000,
            text =>
            {
                var bytes = Fixture.Utf8(text);
                if (ProfiledOrRefused(bytes) is { } profile)
                {
                    profiled++;
                    var table = CsvTable.Read(new MemoryStream(bytes), profile.Dialect, [.. profile.Columns.Select(c => new ColumnRequest(c.Name, c.Numeric, c.MissingCodes))]);
                    Assert.Equal(profile.Rows, table.Rows);
                    Assert.Equal(profile.Columns.Select(c => c.Missing), table.Columns.Select(c => (long)Enumerable.Range(0, c.Rows).Count(c.IsMissing)));
                }
            });
        Assert.InRange(profiled, 200, 20_000);
    }

    private static TableProfile? ProfiledOrRefused(byte[] bytes)
    {
        try
        {
            var profile = Fixture.Profile(bytes);
            Assert.True(profile.Rows > 0);
            Assert.All(profile.Columns, c => Assert.False(string.IsNullOrWhiteSpace(c.Name)));
            return profile;
        }
        catch (IntakeRefusedException refused)
        {
            Assert.NotEmpty(refused.Problems);
            Assert.All(refused.Problems, p => Assert.False(string.IsNullOrWhiteSpace(p.Message)));
            return null;
        }
    }
}
