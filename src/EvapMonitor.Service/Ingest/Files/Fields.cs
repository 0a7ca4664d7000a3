namespace EvapMonitor.Service.Ingest.Files;

/// <summary>Takes the fields of one line: separated by a comma or semicolon, quoted where they hold one (RFC 4180 within a line).</summary>
internal ref struct Fields(ReadOnlySpan<byte> line, byte separator)
{
    private ReadOnlySpan<byte> _rest = line;
    private bool _more = true;

    /// <summary>False when the last field began with a quote that does not end, or has text after it.</summary>
    public bool WellQuoted { get; private set; } = true;

    /// <summary>The next field, without quotes and outer blanks.</summary>
    public bool TryTake(out ReadOnlySpan<byte> field)
    {
        field = default;
        if (!_more) return false;
        if (_rest is [(byte)'"', ..]) return TakeQuoted(out field);
        int at = _rest.IndexOf(separator);
        _more = at >= 0;
        field = (_more ? _rest[..at] : _rest).Trim((byte)' ');
        _rest = _more ? _rest[(at + 1)..] : default;
        return true;
    }

    private bool TakeQuoted(out ReadOnlySpan<byte> field)
    {
        ReadOnlySpan<byte> inner = _rest[1..];
        int end = 0;
        bool doubled = false;
        while (true)
        {
            int at = inner[end..].IndexOf((byte)'"');
            if (at < 0)
            {
                WellQuoted = false;
                _more = false;
                field = inner;
                return true;
            }

            end += at;
            if (end + 1 >= inner.Length || inner[end + 1] != (byte)'"') break;
            doubled = true;
            end += 2;
        }

        field = inner[..end];
        if (doubled) field = System.Text.Encoding.UTF8.GetBytes(System.Text.Encoding.UTF8.GetString(field).Replace("\"\"", "\"", StringComparison.Ordinal));
        ReadOnlySpan<byte> after = inner[(end + 1)..].TrimStart((byte)' ');
        _more = after is not [];
        if (_more && after[0] != separator) (WellQuoted, _more) = (false, false);
        _rest = _more ? after[1..] : default;
        return true;
    }
}
