namespace EvapMonitor.Service.Ingest.Files;

/// <summary>
/// Cuts a stream into lines in constant memory. A file is taken line by line, not by a general CSV reader, so that one broken quote costs one line and not
/// the rest of the file, and every problem has its true line number.
/// </summary>
internal sealed class LineReader(Stream stream)
{
    /// <summary>Longest line, bytes: a wide file of many thousand signals fits.</summary>
    public const int LongestLine = 1 << 20;

    private readonly byte[] _buffer = new byte[LongestLine + (1 << 16)];
    private int _start;
    private int _end;
    private bool _ended;

    /// <summary>Number of the line last returned; the first is 1.</summary>
    public long Number { get; private set; }

    /// <summary>True when the line last returned was cut because it is longer than <see cref="LongestLine"/>.</summary>
    public bool TooLong { get; private set; }

    /// <summary>The next line without its end; the span is good until the next call.</summary>
    public bool TryRead(out ReadOnlySpan<byte> line)
    {
        TooLong = false;
        int scanned = _start;
        while (true)
        {
            int at = _buffer.AsSpan(scanned, _end - scanned).IndexOf((byte)'\n');
            if (at >= 0)
            {
                line = Trim(_buffer.AsSpan(_start, scanned + at - _start));
                _start = scanned + at + 1;
                Number++;
                return true;
            }

            scanned = _end;
            if (_ended)
            {
                line = Trim(_buffer.AsSpan(_start, _end - _start));
                bool any = _end > _start;
                _start = _end;
                if (any) Number++;
                return any;
            }

            if (_end - _start > LongestLine)
            {
                line = _buffer.AsSpan(_start, 0);
                TooLong = true;
                SkipLine();
                Number++;
                return true;
            }

            scanned -= Fill();
        }
    }

    /// <summary>Moves what is left to the front and reads on; returns by how much positions have moved.</summary>
    private int Fill()
    {
        int moved = 0;
        if (_end == _buffer.Length || _start > _buffer.Length / 2)
        {
            moved = _start;
            _buffer.AsSpan(_start, _end - _start).CopyTo(_buffer);
            (_start, _end) = (0, _end - _start);
        }

        int read = stream.Read(_buffer, _end, _buffer.Length - _end);
        _ended = read == 0;
        _end += read;
        return moved;
    }

    private void SkipLine()
    {
        while (true)
        {
            int at = _buffer.AsSpan(_start, _end - _start).IndexOf((byte)'\n');
            if (at >= 0)
            {
                _start += at + 1;
                return;
            }

            (_start, _end) = (0, stream.Read(_buffer, 0, _buffer.Length));
            if (_end > 0) continue;
            _ended = true;
            return;
        }
    }

    private static ReadOnlySpan<byte> Trim(ReadOnlySpan<byte> line) => line is [.. var rest, (byte)'\r'] ? rest : line;
}
