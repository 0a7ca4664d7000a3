using System.Globalization;
using System.Text;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>An invented plant of twenty small lines with a hundred signals, and the readings that load it: the n-th is of signal n modulo 100.</summary>
internal static class LoadPlant
{
    public const int Signals = 100;

    private static readonly string[] Names = [.. Enumerable.Range(0, Signals).Select(i => Invariant($"L{i / 5}.{"FTGPQ"[i % 5]}"))];

    public static string Text
    {
        get
        {
            var text = new StringBuilder("site: Lyngdal\ntime-zone: UTC\natmosphere: 1013 mbar\nhistory-from: 2026-01-01\nlines:\n");
            for (int line = 0; line < Signals / 5; line++)
            {
                text.Append(CultureInfo.InvariantCulture, $$$"""
                      line{{{line}}}:
                        liquor: water
                        feed:
                          flow: {signal: L{{{line}}}.F, unit: t/h, accuracy: 1 %}
                          temperature: {signal: L{{{line}}}.T, unit: degC, accuracy: 0.5 abs}
                        steam:
                          flow: {signal: L{{{line}}}.G, unit: t/h, accuracy: 1 %}
                          pressure: {signal: L{{{line}}}.P, unit: bar, accuracy: 0.01 abs, at: chest}
                        effects:
                        - name: E{{{line}}}
                          heating: steam
                          liquor: feed
                          area: 610 m2
                          vapour: {pressure: {signal: L{{{line}}}.Q, unit: bar, accuracy: 0.01 abs}}

                    """);
            }

            return text.ToString();
        }
    }

    public static string Topic(long n) => Names[n % Signals];

    /// <summary>Instant of a reading: a signal's readings are a fiftieth of a second apart, which makes five thousand a second.</summary>
    public static long At(long start, long n) => start + (n / Signals * 20);

    public static string Payload(long start, long n) => Invariant($"{{\"value\":{n},\"time\":{At(start, n)}}}");

    public static string Sources(int port) => Invariant($$"""
        {"brokers": [{"name": "load", "host": "127.0.0.1", "port": {{port}}, "topics": [{"filter": "#", "message": "object", "time-written": "unix-ms"}]}]}
        """);
}
