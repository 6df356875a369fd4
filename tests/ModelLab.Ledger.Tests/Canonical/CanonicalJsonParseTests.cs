using System.Text;
using System.Text.Json;
using System.Text.Json.Nodes;
using CsCheck;
using ModelLab.Ledger.Canonical;
using Xunit;

namespace ModelLab.Ledger.Tests.Canonical;

public class CanonicalJsonParseTests
{
    [Theory]
    [InlineData("", 0)]
    [InlineData(" 1", 0)]
    [InlineData("1 ", 1)]
    [InlineData("1\n", 1)]
    [InlineData("\ufeff1", 0)]
    [InlineData("1,2", 1)]
    [InlineData("tru", 0)]
    [InlineData("True", 0)]
    [InlineData("nul", 0)]
    [InlineData("NaN", 0)]
    [InlineData("Infinity", 0)]
    [InlineData("-Infinity", 0)]
    [InlineData("'a'", 0)]
    [InlineData("01", 0)]
    [InlineData("00", 0)]
    [InlineData("-0", 0)]
    [InlineData("+1", 0)]
    [InlineData("-", 0)]
    [InlineData(".5", 0)]
    [InlineData("5.", 0)]
    [InlineData("1.0", 0)]
    [InlineData("1.50", 0)]
    [InlineData("1e5", 0)]
    [InlineData("1E+30", 0)]
    [InlineData("1e30", 0)]
    [InlineData("1e+030", 0)]
    [InlineData("10e+29", 0)]
    [InlineData("1e400", 0)]
    [InlineData("1e-400", 0)]
    [InlineData("0.0000001", 0)]
    [InlineData("333333333.33333329", 0)]
    [InlineData("9007199254740993", 0)]
    [InlineData("1000000000000000000000", 0)]
    [InlineData("1-1", 0)]
    [InlineData("00000000000000000000000000000000000000001", 0)]
    [InlineData("[1, 2]", 3)]
    [InlineData("[1,]", 3)]
    [InlineData("[,1]", 1)]
    [InlineData("[1", 2)]
    [InlineData("[1}", 2)]
    [InlineData("[ ]", 1)]
    [InlineData("{ }", 1)]
    [InlineData("{\"a\": 1}", 5)]
    [InlineData("{\"a\" :1}", 4)]
    [InlineData("{\"a\":1,}", 7)]
    [InlineData("{a:1}", 1)]
    [InlineData("{\"a\"}", 4)]
    [InlineData("{\"a\":1", 6)]
    [InlineData("{1:1}", 1)]
    [InlineData("{\"b\":1,\"a\":1}", 7)]
    [InlineData("{\"a\":1,\"a\":1}", 7)]
    [InlineData("{\"\\\"\":1,\"!\":1}", 8)]
    [InlineData("{\"\ufb33\":1,\"\ud83d\ude00\":1}", 9)]
    [InlineData("\"a", 2)]
    [InlineData("\"\t\"", 1)]
    [InlineData("\"\\/\"", 1)]
    [InlineData("\"\\u0041\"", 1)]
    [InlineData("\"\\u000a\"", 1)]
    [InlineData("\"\\u000F\"", 1)]
    [InlineData("\"\\u00f\"", 1)]
    [InlineData("\"\\u001\"", 1)]
    [InlineData("\"\\u007f\"", 1)]
    [InlineData("\"\\u20ac\"", 1)]
    [InlineData("\"\\ud83d\\ude00\"", 1)]
    [InlineData("\"\\ud83d\"", 1)]
    [InlineData("\"\\x\"", 1)]
    [InlineData("\"\\", 1)]
    [InlineData("[1]//", 3)]
    [InlineData("/**/1", 0)]
    public void What_is_not_canonical_is_refused_at_its_byte(string text, int position)
    {
        var bytes = Encoding.UTF8.GetBytes(text);
        Assert.Equal(position, Assert.Throws<CanonicalFormException>(() => CanonicalJson.Parse(bytes)).Position);
        Assert.False(IsCanonicalByRewriting(bytes));
    }

    /// <summary>Overlong forms, a surrogate in UTF-8, beyond U+10FFFF, cut off: RFC 3629 section 3.</summary>
    [Theory]
    [InlineData("22C0AF22")]
    [InlineData("22EDA0BD22")]
    [InlineData("22F490808022")]
    [InlineData("22E282")]
    [InlineData("22E28222")]
    [InlineData("22FF22")]
    public void Text_that_is_not_UTF8_is_refused(string hex) =>
        Assert.Throws<CanonicalFormException>(() => CanonicalJson.Parse(Convert.FromHexString(hex)));

    [Fact]
    public void Depth_is_limited_however_long_the_input()
    {
        var deepest = new string('[', CanonicalJson.MaximumDepth) + new string(']', CanonicalJson.MaximumDepth);
        Assert.NotNull(CanonicalJson.Parse(Encoding.ASCII.GetBytes(deepest)));
        Assert.Throws<CanonicalFormException>(() => CanonicalJson.Parse(Encoding.ASCII.GetBytes("[" + deepest + "]")));
        Assert.Throws<CanonicalFormException>(() => CanonicalJson.Parse(Encoding.ASCII.GetBytes(new string('[', 1_000_000))));
        Assert.Throws<CanonicalFormException>(() => CanonicalJson.Check(Encoding.ASCII.GetBytes(string.Concat(Enumerable.Repeat("{\"a\":", 1_000_000)))));
    }

    [Fact]
    public void Canonical_bytes_of_random_values_are_read_and_written_unchanged() =>
        FixedSamples.Check(RandomJson.Value, 2_000, value =>
        {
            var bytes = CanonicalJson.Serialise(value);
            Assert.Equal(bytes, CanonicalJson.Serialise(CanonicalJson.Parse(bytes)));
            Assert.True(IsCanonicalByRewriting(bytes));
        });

    /// <summary>The order of keys against the rule of RFC 8785 section 3.2.3 done literally on arrays of 16-bit numbers.</summary>
    [Fact]
    public void Keys_are_ordered_by_UTF16_code_units() =>
        FixedSamples.Check(RandomJson.Text.Array[2, 8], 2_000, keys =>
        {
            var value = new JsonObject(keys.Distinct().Select(k => KeyValuePair.Create<string, JsonNode?>(k, 1)));
            var written = CanonicalJson.Parse(CanonicalJson.Serialise(value))!.AsObject().Select(m => m.Key).ToList();
            for (var i = 1; i < written.Count; i++)
            {
                Assert.True(Precedes(written[i - 1], written[i]));
            }
        });

    /// <summary>
    /// The strict reader against the slow rule: read by the platform's JSON reader, written again, compared. Bytes of
    /// random values with a random byte put in, taken out or changed must get the same verdict from both.
    /// </summary>
    [Fact]
    public void The_strict_reader_agrees_with_reading_and_writing_again()
    {
        var refused = 0;
        var accepted = 0;
        FixedSamples.Check(Gen.Select(RandomJson.Value, Gen.Int[0, 10_000], Gen.Int[0, 2], Gen.Byte), 10_000, sample =>
        {
            var (value, place, edit, with) = sample;
            var bytes = CanonicalJson.Serialise(value).ToList();
            var at = place % bytes.Count;
            switch (edit)
            {
                case 0:
                    bytes[at] = with;
                    break;
                case 1:
                    bytes.Insert(at, with);
                    break;
                default:
                    bytes.RemoveAt(at);
                    break;
            }

            byte[] edited = [.. bytes];
            var canonical = IsCanonical(edited);
            Assert.Equal(IsCanonicalByRewriting(edited), canonical);
            _ = canonical ? accepted++ : refused++;
        });
        Assert.True(refused > 1_000 && accepted > 200, $"{refused} refused, {accepted} accepted");
    }

    private static bool IsCanonical(byte[] bytes)
    {
        try
        {
            CanonicalJson.Check(bytes);
            return true;
        }
        catch (CanonicalFormException)
        {
            return false;
        }
    }

    private static bool IsCanonicalByRewriting(byte[] bytes)
    {
        try
        {
            return CanonicalJson.Serialise(JsonNode.Parse(bytes)).AsSpan().SequenceEqual(bytes);
        }
        catch (Exception e) when (e is JsonException or ArgumentException or InvalidOperationException)
        {
            return false;
        }
    }

    private static bool Precedes(string left, string right)
    {
        for (var k = 0; k < left.Length && k < right.Length; k++)
        {
            if (left[k] != right[k])
            {
                return (ushort)left[k] < (ushort)right[k];
            }
        }

        return left.Length < right.Length;
    }
}
