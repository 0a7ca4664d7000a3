namespace EvapMonitor.Service.Ingest.Files;

/// <summary>A forward-only stream over another one.</summary>
internal abstract class ForwardStream(Stream inner) : Stream
{
    protected Stream Inner { get; } = inner;

    public override bool CanRead => true;

    public override bool CanSeek => false;

    public override bool CanWrite => false;

    public override long Length => throw new NotSupportedException();

    public override long Position
    {
        get => throw new NotSupportedException();
        set => throw new NotSupportedException();
    }

    public override void Flush()
    {
    }

    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    public override void SetLength(long value) => throw new NotSupportedException();

    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();

    protected override void Dispose(bool disposing)
    {
        if (disposing) Inner.Dispose();
        base.Dispose(disposing);
    }
}

/// <summary>Gives back bytes that were taken from a stream to look at them.</summary>
internal sealed class PrefixedStream(byte[] prefix, Stream inner) : ForwardStream(inner)
{
    private int _given;

    public override int Read(byte[] buffer, int offset, int count)
    {
        if (_given == prefix.Length) return Inner.Read(buffer, offset, count);
        int taken = int.Min(count, prefix.Length - _given);
        Array.Copy(prefix, _given, buffer, offset, taken);
        _given += taken;
        return taken;
    }
}

/// <summary>Stops a stream that yields more than a limit: a small compressed file can unfold without end.</summary>
internal sealed class LimitedStream(Stream inner, long limit) : ForwardStream(inner)
{
    private long _left = limit;

    public override int Read(byte[] buffer, int offset, int count)
    {
        int read = Inner.Read(buffer, offset, count);
        _left -= read;
        return _left >= 0 ? read : throw new ReadingFileException($"The file unfolds to more than is allowed ({ReadingFile.LargestUnfolded >> 30} GiB).");
    }
}

/// <summary>Counts what has been read, for progress.</summary>
internal sealed class CountedStream(Stream inner) : ForwardStream(inner)
{
    public long BytesRead { get; private set; }

    public override int Read(byte[] buffer, int offset, int count)
    {
        int read = Inner.Read(buffer, offset, count);
        BytesRead += read;
        return read;
    }
}
