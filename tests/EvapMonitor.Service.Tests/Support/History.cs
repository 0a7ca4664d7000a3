using System.Globalization;
using System.Text;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>Files of readings for the small plant, and the check that two databases hold the same.</summary>
internal static class History
{
    /// <summary>Number of readings and a checksum over them all.</summary>
    public const string Checksum =
        "SELECT count(*) || ' ' || coalesce(sum(hashtextextended(concat_ws('|', name, extract(epoch FROM at), value, quality), 0)), 0) FROM reading JOIN signal USING (signal_id)";

    private static readonly string[] Signals = ["FT-1", "TT-1", "FT-2", "PT-2", "PT-1"];

    /// <summary>A long file of a number of readings, five signals every five seconds from 1 April 2026 on.</summary>
    public static byte[] Long(int readings)
    {
        var text = new StringBuilder("time,signal,value\n", readings * 34);
        var start = new DateTime(2026, 4, 1, 0, 0, 0, DateTimeKind.Utc);
        for (int i = 0; i < readings; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"{start.AddSeconds(i / Signals.Length * 5):yyyy-MM-ddTHH:mm:ssZ},{Signals[i % Signals.Length]},{i * 7919L % 10007 / 100.0:0.##}\n");
        }

        return Encoding.UTF8.GetBytes(text.ToString());
    }
}
