using System.Diagnostics;
using System.Diagnostics.Metrics;

namespace EvapMonitor.Service.Evaluation;

/// <summary>How long evaluation spends at each of its stations, for whoever listens to the meter.</summary>
internal static class EvaluationTimes
{
    /// <summary>Name of the meter.</summary>
    public const string MeterName = "EvapMonitor.Evaluation";

    private static readonly Meter Meter = new(MeterName);
    private static readonly Counter<double> Time = Meter.CreateCounter<double>("evapmonitor.evaluation.time", "s", "Time spent, by station: read, compute, write.");

    /// <summary>A beginning.</summary>
    public static long Begin() => Stopwatch.GetTimestamp();

    /// <summary>Counts the time since a beginning for a station, and gives the beginning of the next.</summary>
    public static long Count(string station, long begin)
    {
        long end = Stopwatch.GetTimestamp();
        Time.Add(Stopwatch.GetElapsedTime(begin, end).TotalSeconds, new KeyValuePair<string, object?>("station", station));
        return end;
    }
}
