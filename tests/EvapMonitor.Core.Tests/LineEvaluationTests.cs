using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Core.Tests.Coefficients;

namespace EvapMonitor.Core.Tests;

public class LineEvaluationTests
{
    private const long Window = 5 * Milliseconds.Minute;

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void WindowByWindowWithLateReadings_GivesTheBitsOfTheWholeDay(int state)
    {
        (LineEvaluation evaluation, Dictionary<string, ReadingSeries> all) = Noisy(state);
        long day = 2 * Milliseconds.Day;
        LineWindow[] whole = evaluation.Evaluate(all, day, day + Milliseconds.Day, LineLog.Empty);

        // The same day as it comes: readings up to the end of each window, some of them an hour late.
        var random = new Random(state);
        LineMemory memory = evaluation.NewMemory();
        var arrived = all.Keys.ToDictionary(signal => signal, _ => new ReadingSeries());
        var late = new List<(string Signal, Reading Reading)>();
        var live = new SortedDictionary<long, LineWindow>();
        long seen = 0;
        for (long end = day + Window; end <= day + Milliseconds.Day; end += Window)
        {
            long changed = end - Window;
            foreach ((string signal, ReadingSeries series) in all)
            {
                for (int i = series.IndexFrom(seen); i < series.IndexFrom(end); i++)
                {
                    var reading = new Reading(series.At[i], series.Value[i], series.Quality[i]);
                    if (reading.At >= day && random.Next(50) == 0) late.Add((signal, reading));
                    else arrived[signal].Add(reading);
                }
            }

            seen = end;
            foreach ((string signal, Reading reading) in late.Where(one => one.Reading.At < end - Milliseconds.Hour || end == day + Milliseconds.Day).ToList())
            {
                arrived[signal].Add(reading);
                changed = long.Min(changed, reading.At - Milliseconds.Modulo(reading.At, Window));
                late.Remove((signal, reading));
            }

            memory.Forget(changed);
            foreach (LineWindow window in evaluation.Evaluate(memory, arrived, changed, end, LineLog.Empty)) live[window.At] = window;
        }

        Assert.Equal(whole.Length, live.Count);
        foreach ((LineWindow one, LineWindow other) in whole.Zip(live.Values))
        {
            Assert.Equal(one.Effects, other.Effects);
            Assert.Equal((one.At, one.State, one.Evaporation), (other.At, other.State, other.Evaporation));
        }
    }

    [Fact]
    public void Reach_CoversEveryWindowThatAReadingMoves()
    {
        (LineEvaluation evaluation, Dictionary<string, ReadingSeries> all) = Noisy(9);
        long day = 2 * Milliseconds.Day, at = day + (6 * Milliseconds.Hour);
        LineWindow[] before = evaluation.Evaluate(all, day, day + Milliseconds.Day, LineLog.Empty);
        foreach (ReadingSeries series in all.Values) series.Add(new Reading(at + 7, 1e3, Quality.Good));
        LineWindow[] after = evaluation.Evaluate(all, day, day + Milliseconds.Day, LineLog.Empty);
        long[] moved = [.. before.Zip(after).Where(pair => !pair.First.Effects.SequenceEqual(pair.Second.Effects)).Select(pair => pair.First.At)];
        Assert.NotEmpty(moved);
        Assert.True(moved[0] >= at - Window);
        Assert.True(moved[^1] < at + evaluation.Reach.TotalMilliseconds, $"moved until {(moved[^1] - at) / (double)Milliseconds.Hour} h after");
    }

    [Fact]
    public void ExcludedInstrument_IsAbsentInItsInterval_AndTheReasonSaysWho()
    {
        (LineEvaluation plain, Dictionary<string, ReadingSeries> all) = Noisy(4);
        Line line = TestLine.Line();
        var site = new Site { Name = "site", TimeZone = "UTC", Atmosphere = new(101_325, null), HistoryFrom = DateTimeOffset.UnixEpoch, Lines = [line] };
        long day = 2 * Milliseconds.Day, from = day + Milliseconds.Hour + 1, to = day + (2 * Milliseconds.Hour);
        LineLog log = LineLog.Empty with { Exclusions = new[] { "P2" }.ToLookup(signal => signal, _ => (from, to)) };
        bool IsAbsent(LineWindow window) => double.IsNaN(window.Balance!.Correction[window.Balance.Layout.Signals.ToList().IndexOf("P2")]);
        LineWindow[] without = new LineEvaluation(site, line).Evaluate(all, day, day + (3 * Milliseconds.Hour), log), with = plain.Evaluate(all, day, day + (3 * Milliseconds.Hour), LineLog.Empty);
        Assert.True(with.Count(IsAbsent) < 6);
        foreach ((LineWindow one, LineWindow other) in without.Zip(with)) Assert.Equal((one.At + Window > from && one.At < to) || IsAbsent(other), IsAbsent(one));

        LineLog alone = LineLog.Empty with { Exclusions = TestLine.Values.Keys.Where(signal => signal != "FF").ToLookup(signal => signal, _ => (day, long.MaxValue)) };
        Assert.Contains(plain.Evaluate(all, day, day + Milliseconds.Hour, alone).SelectMany(window => window.Effects), effect => effect.Reason?.EndsWith("is excluded by a person", StringComparison.Ordinal) == true);
    }

    private static (LineEvaluation Evaluation, Dictionary<string, ReadingSeries> Readings) Noisy(int state)
    {
        var random = new Random(state);
        Line line = TestLine.Line();
        var site = new Site { Name = "site", TimeZone = "UTC", Atmosphere = new(101_325, null), HistoryFrom = DateTimeOffset.UnixEpoch, Lines = [line] };
        var readings = new Dictionary<string, ReadingSeries>();
        foreach ((string signal, double value) in TestLine.Values)
        {
            var series = readings[signal] = new ReadingSeries();
            double held = value;
            for (long at = Milliseconds.Day; at < 3 * Milliseconds.Day; at += random.Next(20, 200) * 1000)
            {
                // A stretch of standing still, a gap, bad quality: all of it must come out the same either way.
                bool frozen = signal == "C2" && at > 2 * Milliseconds.Day + (8 * Milliseconds.Hour) && at < 2 * Milliseconds.Day + (14 * Milliseconds.Hour);
                if (signal == "P2" && at > 2 * Milliseconds.Day + (16 * Milliseconds.Hour) && at < 2 * Milliseconds.Day + (17 * Milliseconds.Hour)) continue;
                if (!frozen) held = value * (1 + (0.003 * (random.NextDouble() - 0.5)));
                series.Add(new Reading(at, held, random.Next(40) == 0 ? Quality.Bad : Quality.Good));
            }
        }

        return (new LineEvaluation(site, line), readings);
    }
}
