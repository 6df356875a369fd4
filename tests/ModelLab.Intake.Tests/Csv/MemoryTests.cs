using System.Globalization;
using ModelLab.Intake.Csv;
using ModelLab.Statistics.Designs;

namespace ModelLab.Intake.Tests.Csv;

/// <summary>Tests that measure memory, with no other test beside them.</summary>
[CollectionDefinition(nameof(MemoryCollection), DisableParallelization = true)]
public sealed class MemoryCollection;

/// <summary>A file of 100 MB, made while it is read, is profiled without being kept. Memory is measured on the garbage-collected heap, time is not.</summary>
[Collection(nameof(MemoryCollection))]
public sealed class MemoryTests
{
    private const long FileBytes = 100_000_000;
    private const long MostGrowth = 12_000_000;

    [Fact]
    public void Profiling_a_hundred_megabytes_keeps_little()
    {
        using var file = new GeneratedTable(FileBytes);
        var before = GC.GetTotalMemory(forceFullCollection: true);
        file.Sample = () => GC.GetTotalMemory(forceFullCollection: true) - before;

        var profile = CsvTable.Profile(file, new CsvOptions(), TestContext.Current.CancellationToken);

        Assert.Equal(file.Rows, profile.Rows);
        Assert.True(file.Bytes >= FileBytes);
        Assert.InRange(file.Samples, 10, int.MaxValue);
        Assert.InRange(file.Most, 0, MostGrowth);
        Assert.True(profile.Columns[0].DistinctCapped);
        Assert.Equal(11, profile.Columns[2].Distinct);
    }

    [Fact]
    public void Reading_keeps_only_the_columns_asked_for()
    {
        using var file = new GeneratedTable(FileBytes / 4);
        var before = GC.GetTotalMemory(forceFullCollection: true);

        var table = CsvTable.Read(file, new CsvDialect("utf-8", false, ',', '.'), [new ColumnRequest("id", true, [])], TestContext.Current.CancellationToken);

        var grown = GC.GetTotalMemory(forceFullCollection: true) - before;
        var column = Assert.IsType<NumberColumn>(Assert.Single(table.Columns));
        Assert.Equal(file.Rows, column.Rows);
        Assert.True(column.Remainders.IsEmpty);
        Assert.InRange(grown, (long)(7.9 * column.Rows), (long)(8.5 * column.Rows) + 1_000_000);
    }

    /// <summary>Text of a table, generated as it is read: identifier, decimal, category, comment in quotes.</summary>
    private sealed class GeneratedTable(long bytes) : Stream
    {
        private const long BytesBetweenSamples = 8_000_000;

        private byte[] block = "id,x,category,comment\n"u8.ToArray();
        private int position;
        private long nextSample = BytesBetweenSamples;

        internal Func<long>? Sample { get; set; }

        internal long Most { get; private set; }

        internal int Samples { get; private set; }

        internal long Rows { get; private set; }

        internal long Bytes { get; private set; }

        public override bool CanRead => true;

        public override bool CanSeek => false;

        public override bool CanWrite => false;

        public override long Length => throw new NotSupportedException();

        public override long Position { get => throw new NotSupportedException(); set => throw new NotSupportedException(); }

        public override int Read(byte[] buffer, int offset, int count)
        {
            if (position == block.Length)
            {
                if (Bytes >= bytes)
                {
                    return 0;
                }

                var row = Rows++;
                block = Fixture.Utf8(string.Create(CultureInfo.InvariantCulture, $"{row * 3},{row * 0.37:F3},c{row % 11},\"row {row}, \"\"quoted\"\" and\nbroken\"\n"));
                position = 0;
            }

            var taken = Math.Min(count, block.Length - position);
            block.AsSpan(position, taken).CopyTo(buffer.AsSpan(offset));
            position += taken;
            Bytes += taken;
            if (Sample is not null && Bytes >= nextSample)
            {
                Samples++;
                Most = Math.Max(Most, Sample());
                nextSample += BytesBetweenSamples;
            }

            return taken;
        }

        public override void Flush()
        {
        }

        public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

        public override void SetLength(long value) => throw new NotSupportedException();

        public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();
    }
}
