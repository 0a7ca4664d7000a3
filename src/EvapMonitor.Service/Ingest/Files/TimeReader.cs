using System.Buffers.Text;
using NodaTime;
using NodaTime.TimeZones;

namespace EvapMonitor.Service.Ingest.Files;

/// <summary>What is known of the clock of one series of times: needed to tell the two passes of an hour that a clock change repeats.</summary>
internal struct ClockState
{
    /// <summary>The local time last seen, ms.</summary>
    public long LastLocal;

    /// <summary>True while in the second pass of a repeated stretch.</summary>
    public bool SecondPass;
}

/// <summary>
/// Reads times: RFC 3339, or the plant's local time without an offset. A local time that a clock change repeats belongs to the first pass until the times of
/// its series step back (or stand), then to the second.
/// </summary>
internal sealed class TimeReader(DateTimeZone zone)
{
    private const long QuarterHour = 15 * 60 * 1000;

    private long _quarter = long.MinValue;
    private ZoneLocalMapping? _mapping;

    /// <summary>Reads a time.</summary>
    /// <param name="text">The field.</param>
    /// <param name="state">The clock of the series it belongs to.</param>
    /// <param name="at">The instant, ms since 1970-01-01T00:00:00Z.</param>
    /// <returns>Null, or what is wrong.</returns>
    public string? Read(ReadOnlySpan<byte> text, ref ClockState state, out long at)
    {
        at = 0;
        const string wrong = "is not a time such as 2026-03-01T14:05:00Z or 2026-03-01 14:05:00";
        if (!TryDigits(text, 0, 4, out int year) || !Is(text, 4, '-') || !TryDigits(text, 5, 2, out int month) || !Is(text, 7, '-') || !TryDigits(text, 8, 2, out int day)
            || text.Length < 16 || text[10] is not ((byte)'T' or (byte)'t' or (byte)' ') || !TryDigits(text, 11, 2, out int hour) || !Is(text, 13, ':')
            || !TryDigits(text, 14, 2, out int minute)) return wrong;
        int second = 0, next = 16;
        long thousandths = 0;
        if (Is(text, 16, ':'))
        {
            if (!TryDigits(text, 17, 2, out second)) return wrong;
            next = 19;
            if (Is(text, 19, '.') || Is(text, 19, ','))
            {
                int digits = 0;
                for (next = 20; next < text.Length && text[next] is >= (byte)'0' and <= (byte)'9'; next++, digits++)
                {
                    if (digits < 3) thousandths = (thousandths * 10) + text[next] - '0';
                }

                if (digits == 0) return wrong;
                for (; digits < 3; digits++) thousandths *= 10;
            }
        }

        if (year < 1900 || month is < 1 or > 12 || day < 1 || day > DateTime.DaysInMonth(year, month) || hour > 23 || minute > 59 || second > 60) return wrong;
        // A leap second has no instant of its own here: it counts as the second before.
        long local = ((new DateTime(year, month, day, hour, minute, int.Min(second, 59), DateTimeKind.Utc).Ticks - DateTime.UnixEpoch.Ticks) / TimeSpan.TicksPerMillisecond)
            + thousandths;
        ReadOnlySpan<byte> tail = text[next..];
        if (tail.IsEmpty) return FromLocal(local, ref state, out at);
        if (tail is [(byte)'Z' or (byte)'z'])
        {
            at = local;
            return null;
        }

        if (tail.Length != 6 || tail[0] is not ((byte)'+' or (byte)'-') || !TryDigits(tail, 1, 2, out int hours) || tail[3] != ':' || !TryDigits(tail, 4, 2, out int minutes)
            || hours > 23 || minutes > 59) return wrong;
        long offset = ((hours * 60L) + minutes) * 60_000;
        at = tail[0] == '+' ? local - offset : local + offset;
        return null;
    }

    private string? FromLocal(long local, ref ClockState state, out long at)
    {
        ZoneLocalMapping mapping = MappingOf(local);
        at = 0;
        if (mapping.Count == 0) return $"does not exist in {zone.Id}: clocks were put forward over it";
        if (mapping.Count == 1) state.SecondPass = false;
        else if (!state.SecondPass && state.LastLocal >= local && MappingOf(state.LastLocal).Count == 2) state.SecondPass = true;
        state.LastLocal = local;
        ZoneInterval interval = mapping.Count == 2 && state.SecondPass ? mapping.LateInterval : mapping.EarlyInterval;
        at = local - interval.WallOffset.Milliseconds;
        return null;
    }

    private ZoneLocalMapping MappingOf(long local)
    {
        long quarter = local - Core.Readings.Milliseconds.Modulo(local, QuarterHour);
        if (_mapping is not null && quarter == _quarter) return _mapping;
        _quarter = quarter;
        return _mapping = zone.MapLocal(LocalDateTime.FromDateTime(DateTime.UnixEpoch.AddMilliseconds(quarter)));
    }

    private static bool Is(ReadOnlySpan<byte> text, int at, char expected) => at < text.Length && text[at] == expected;

    private static bool TryDigits(ReadOnlySpan<byte> text, int at, int count, out int value)
    {
        value = 0;
        return text.Length >= at + count && Utf8Parser.TryParse(text.Slice(at, count), out value, out int used) && used == count && text[at] is >= (byte)'0' and <= (byte)'9';
    }
}
