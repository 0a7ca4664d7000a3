using EvapMonitor.Core.Plant;
using NodaTime;
using NodaTime.Text;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Time zone, window and the start of history.</summary>
internal static class Calendar
{
    public const string ZoneAllowed = "an IANA time zone such as Europe/Copenhagen or UTC";
    public const string StartAllowed = "a date such as 2025-01-01 (midnight at the site) or an instant such as 2025-01-01T06:00:00Z, from 1970 to 2199";

    public static string? TimeZone(PlantNode? node, Findings findings)
    {
        string? id = Texts.Text(node, ZoneAllowed, findings);
        if (id is null || DateTimeZoneProviders.Tzdb.Ids.Contains(id)) return id;
        string? nearest = KeySet.NearestOf(id, DateTimeZoneProviders.Tzdb.Ids);
        findings.Wrong(node!, nearest is null ? ZoneAllowed : $"{ZoneAllowed}; perhaps {nearest}");
        return null;
    }

    /// <summary>The start of history; null when absent or wrong. A date needs the zone and without it is only checked.</summary>
    public static DateTimeOffset? Start(PlantNode? node, string? zone, Findings findings)
    {
        string? text = Texts.Text(node, StartAllowed, findings);
        if (text is null) return null;
        if (LocalDatePattern.Iso.Parse(text) is { Success: true } date && date.Value.Year is >= 1970 and < 2200)
            return DateTimeZoneProviders.Tzdb[zone ?? "UTC"].AtStartOfDay(date.Value).ToInstant().ToDateTimeOffset();
        if (OffsetDateTimePattern.ExtendedIso.Parse(text) is { Success: true } instant && instant.Value.Year is >= 1970 and < 2200)
            return instant.Value.ToInstant().ToDateTimeOffset();
        findings.Wrong(node!, StartAllowed);
        return null;
    }

    public static TimeSpan? Window(PlantNode? node, Findings findings) =>
        Quantities.Read(node, Dimension.Duration, s => s is >= 60 and <= 3600 && 3600 % s == 0, "from 1 to 60 min, dividing an hour", findings) is { } seconds
            ? TimeSpan.FromSeconds(seconds)
            : null;
}
