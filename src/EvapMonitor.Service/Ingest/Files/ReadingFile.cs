using System.Globalization;
using System.IO.Compression;
using System.Text;
using EvapMonitor.Core.Readings;
using NodaTime;

namespace EvapMonitor.Service.Ingest.Files;

/// <summary>Receives what a file holds, row by row.</summary>
internal interface IReadingSink
{
    /// <summary>Key of a signal; negative when the plant does not name it.</summary>
    int KeyOf(string signal);

    /// <summary>A reading of a signal with its key. Never called for an unknown signal.</summary>
    void Take(int key, in Reading reading);

    /// <summary>A reading of a signal that the plant does not name.</summary>
    void TakeUnknown(string signal);

    /// <summary>A row, or a cell of a wide row, that cannot be used.</summary>
    void Reject(long line, string reason);

    /// <summary>A row is done: a place where a batch may end. Returns false to stop.</summary>
    bool RowDone(long line);
}

/// <summary>The file cannot be read at all: no header, wrong columns, not text.</summary>
public sealed class ReadingFileException(string message) : Exception(message);

/// <summary>
/// Reads history from CSV, long (time,signal,value[,quality]) or wide (time,SIGNAL,…), comma or semicolon, plain or gzip, in constant memory.
/// A bad row never stops the file.
/// </summary>
internal sealed class ReadingFile
{
    /// <summary>Most bytes that a compressed file may unfold to.</summary>
    public const long LargestUnfolded = 64L << 30;

    private readonly LineReader _lines;
    private readonly TimeReader _times;
    private readonly IReadingSink _sink;
    private readonly long _earliest;
    private readonly long _latest;
    private byte _separator;
    private bool _wide;
    private int _columns;
    private string[] _names = [];
    private int[] _keys = [];

    /// <summary>Prepares to read.</summary>
    /// <param name="stream">The file; gzip is recognised by its first two bytes.</param>
    /// <param name="zone">Zone of times without an offset.</param>
    /// <param name="earliest">Earlier readings are refused, ms.</param>
    /// <param name="latest">Later readings are refused, ms.</param>
    /// <param name="sink">Receives what the file holds.</param>
    public ReadingFile(Stream stream, DateTimeZone zone, long earliest, long latest, IReadingSink sink)
    {
        _lines = new LineReader(Unfold(stream));
        _times = new TimeReader(zone);
        (_earliest, _latest, _sink) = (earliest, latest, sink);
    }

    /// <summary>Reads to the end, or until the sink stops it.</summary>
    /// <exception cref="ReadingFileException">There is no usable header.</exception>
    public void Read()
    {
        ReadHeader();
        var rowClock = default(ClockState);
        var clocks = new Dictionary<string, ClockState>();
        var names = new Dictionary<string, string>().GetAlternateLookup<ReadOnlySpan<char>>();
        while (_lines.TryRead(out ReadOnlySpan<byte> line))
        {
            if (_lines.TooLong) _sink.Reject(_lines.Number, $"the line is longer than {LineReader.LongestLine} bytes");
            else if (line.IndexOf((byte)0) >= 0) _sink.Reject(_lines.Number, "the line holds a zero byte: not a text file");
            else if (!line.IsEmpty && _wide) ReadWide(line, ref rowClock);
            else if (!line.IsEmpty) ReadLong(line, clocks, names);
            if (!_sink.RowDone(_lines.Number)) return;
        }
    }

    private static Stream Unfold(Stream stream)
    {
        var buffered = new BufferedStream(stream, 1 << 16);
        Span<byte> magic = stackalloc byte[2];
        int read = buffered.ReadAtLeast(magic, 2, throwOnEndOfStream: false);
        var whole = new PrefixedStream(magic[..read].ToArray(), buffered);
        return read == 2 && magic is [0x1f, 0x8b] ? new LimitedStream(new GZipStream(whole, CompressionMode.Decompress), LargestUnfolded) : whole;
    }

    private void ReadHeader()
    {
        if (!_lines.TryRead(out ReadOnlySpan<byte> line) || _lines.TooLong) throw new ReadingFileException("The file is empty or has no header; it must begin with time,signal,value or time,SIGNAL,…");
        if (line is [0xEF, 0xBB, 0xBF, ..]) line = line[3..];
        _separator = line.IndexOf((byte)';') >= 0 && (line.IndexOf((byte)',') < 0 || line.IndexOf((byte)';') < line.IndexOf((byte)',')) ? (byte)';' : (byte)',';
        var header = new List<string>();
        var fields = new Fields(line, _separator);
        while (fields.TryTake(out ReadOnlySpan<byte> field)) header.Add(Encoding.UTF8.GetString(field));
        if (header is not [var first, _, ..] || !first.Equals("time", StringComparison.OrdinalIgnoreCase) || !fields.WellQuoted)
            throw new ReadingFileException($"Line 1: found \"{Shown(line)}\"; the header must be time,signal,value[,quality] or time and the names of signals, separated by commas or semicolons.");
        bool IsNamed(int column, string name) => header.Count > column && header[column].Equals(name, StringComparison.OrdinalIgnoreCase);
        bool isLong = IsNamed(1, "signal") && IsNamed(2, "value");
        // A long header with a slip in it would pass as a wide one of unknown signals, and the file would be counted away.
        if (isLong && header.Count != 3 && (header.Count != 4 || !IsNamed(3, "quality")))
            throw new ReadingFileException($"Line 1: found \"{Shown(line)}\"; after time,signal,value the header may have one more column, quality.");
        _wide = !isLong;
        _columns = header.Count;
        _names = [.. header.Skip(1)];
        if (!_wide) return;
        if (_names.Any(string.IsNullOrEmpty) || _names.Distinct().Count() != _names.Length)
            throw new ReadingFileException("Line 1: every column after time needs the name of a signal, each once.");
        _keys = [.. _names.Select(_sink.KeyOf)];
    }

    /// <summary>A row with a column too few or too many gives nothing: its last number may be half a number, and nobody knows which cell is whose.</summary>
    private string? WhyRowIsWrong(ReadOnlySpan<byte> line)
    {
        var fields = new Fields(line, _separator);
        int columns = 0;
        while (fields.TryTake(out _)) columns++;
        if (!fields.WellQuoted) return "a quote is not closed";
        return columns == _columns ? null : $"{columns} columns where the header has {_columns}";
    }

    private void ReadWide(ReadOnlySpan<byte> line, ref ClockState clock)
    {
        if (WhyRowIsWrong(line) is { } wrongRow)
        {
            _sink.Reject(_lines.Number, wrongRow);
            return;
        }

        var fields = new Fields(line, _separator);
        fields.TryTake(out ReadOnlySpan<byte> time);
        if (WhyTimeIsWrong(time, ref clock, out long at) is { } wrong)
        {
            _sink.Reject(_lines.Number, wrong);
            return;
        }

        for (int column = 0; fields.TryTake(out ReadOnlySpan<byte> cell); column++)
        {
            if (cell.IsEmpty) continue;
            if (_keys[column] < 0) _sink.TakeUnknown(_names[column]);
            else if (TryNumber(cell, out double value)) _sink.Take(_keys[column], new Reading(at, value, Quality.Good));
            else _sink.Reject(_lines.Number, $"{_names[column]}: value '{Shown(cell)}' is not a number");
        }
    }

    private void ReadLong(ReadOnlySpan<byte> line, Dictionary<string, ClockState> clocks, Dictionary<string, string>.AlternateLookup<ReadOnlySpan<char>> names)
    {
        var fields = new Fields(line, _separator);
        fields.TryTake(out ReadOnlySpan<byte> time);
        bool complete = fields.TryTake(out ReadOnlySpan<byte> name) & fields.TryTake(out ReadOnlySpan<byte> number);
        bool hasQuality = fields.TryTake(out ReadOnlySpan<byte> code);
        if (!complete || fields.TryTake(out _) || (hasQuality && _columns == 3) || !fields.WellQuoted)
        {
            _sink.Reject(_lines.Number, fields.WellQuoted ? $"the row needs {_columns} columns as the header has" : "a quote is not closed");
            return;
        }

        string? signal = NameOf(name, names);
        if (signal is null)
        {
            _sink.Reject(_lines.Number, name.IsEmpty ? "no signal is named" : "the signal's name is longer than 200 bytes");
            return;
        }

        ref ClockState clock = ref System.Runtime.InteropServices.CollectionsMarshal.GetValueRefOrAddDefault(clocks, signal, out _);
        double value = double.NaN;
        Quality quality = default;
        string? wrong = WhyTimeIsWrong(time, ref clock, out long at);
        if (wrong is null && !QualityCodes.TryRead(code, out quality)) wrong = $"quality '{Shown(code)}' is none of good, uncertain, bad or an OPC UA status code";
        if (wrong is null && number.IsEmpty && quality != Quality.Bad) wrong = "no value";
        if (wrong is null && !number.IsEmpty && !TryNumber(number, out value)) wrong = $"value '{Shown(number)}' is not a number";
        if (wrong is not null)
        {
            _sink.Reject(_lines.Number, wrong);
            return;
        }

        int key = _sink.KeyOf(signal);
        if (key < 0) _sink.TakeUnknown(signal);
        else _sink.Take(key, new Reading(at, value, quality));
    }

    /// <summary>The name as a string, made once for each name; bounded, so that a file of random names does not fill the memory.</summary>
    private static string? NameOf(ReadOnlySpan<byte> name, Dictionary<string, string>.AlternateLookup<ReadOnlySpan<char>> names)
    {
        if (name.IsEmpty || name.Length > 200) return null;
        Span<char> chars = stackalloc char[name.Length];
        ReadOnlySpan<char> text = chars[..Encoding.UTF8.GetChars(name, chars)];
        if (names.TryGetValue(text, out string? known)) return known;
        string fresh = text.ToString();
        if (names.Dictionary.Count < 20_000) names[text] = fresh;
        return fresh;
    }

    private string? WhyTimeIsWrong(ReadOnlySpan<byte> text, ref ClockState clock, out long at)
    {
        if (_times.Read(text, ref clock, out at) is { } wrong) return $"time '{Shown(text)}' {wrong}";
        if (at < _earliest) return $"time '{Shown(text)}' is before the plant file's history-from";
        return at > _latest ? $"time '{Shown(text)}' is more than 10 minutes ahead" : null;
    }

    private bool TryNumber(ReadOnlySpan<byte> text, out double value)
    {
        if (_separator == (byte)';' && text.IndexOf((byte)',') is >= 0 and var comma && text.Length <= 64)
        {
            Span<byte> pointed = stackalloc byte[text.Length];
            text.CopyTo(pointed);
            // A point beside the comma would be a mark of thousands, which could be read two ways.
            if (pointed.IndexOf((byte)'.') >= 0)
            {
                value = 0;
                return false;
            }

            pointed[comma] = (byte)'.';
            return Parse(pointed, out value);
        }

        return Parse(text, out value);
    }

    private static bool Parse(ReadOnlySpan<byte> text, out double value) =>
        double.TryParse(text, NumberStyles.AllowLeadingSign | NumberStyles.AllowDecimalPoint | NumberStyles.AllowExponent, CultureInfo.InvariantCulture, out value)
        && double.IsFinite(value);

    private static string Shown(ReadOnlySpan<byte> text)
    {
        string shown = Encoding.UTF8.GetString(text.Length > 60 ? text[..60] : text);
        shown = string.Concat(shown.Select(letter => char.IsControl(letter) ? '·' : letter));
        return text.Length > 60 ? shown + "…" : shown;
    }
}
