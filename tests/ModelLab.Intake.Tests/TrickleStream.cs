namespace ModelLab.Intake.Tests;

/// <summary>A stream that cannot seek and gives at most a few bytes at a time, as a network does.</summary>
internal sealed class TrickleStream(byte[] bytes, int most) : Stream
{
    private int position;

    public override bool CanRead => true;

    public override bool CanSeek => false;

    public override bool CanWrite => false;

    public override long Length => throw new NotSupportedException();

    public override long Position { get => throw new NotSupportedException(); set => throw new NotSupportedException(); }

    public override int Read(byte[] buffer, int offset, int count)
    {
        var taken = Math.Min(Math.Min(count, most), bytes.Length - position);
        bytes.AsSpan(position, taken).CopyTo(buffer.AsSpan(offset));
        position += taken;
        return taken;
    }

    public override void Flush()
    {
    }

    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    public override void SetLength(long value) => throw new NotSupportedException();

    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();
}
