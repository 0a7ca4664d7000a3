using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using EvapMonitor.Core.Readings;
using EvapMonitor.Core.Tests.Balances;
using EvapMonitor.Core.Tests.Coefficients;

namespace EvapMonitor.Core.Tests;

/// <summary>What a line was doing and whether it was steady, through the whole evaluation.</summary>
public class LineStateTests
{
    private const long Window = 5 * Milliseconds.Minute, Day = 2 * Milliseconds.Day;
    private static readonly UnitOfMeasure Number = new("1", Dimension.Number, 1);

    [Fact]
    public void NoiseAroundAPoint_IsSteadyAllDay() =>
        Mostly(true, Evaluate(TestLine.Line(), Readings()));

    [Fact]
    public void FlatReadings_AreNotJudged() =>
        Assert.All(Evaluate(TestLine.Line(), Readings(noise: 0)), window => Assert.Null(window.Steady));

    [Fact]
    public void StepOfTheFeed_WindowsAreNotSteadyUntilItHasSettled()
    {
        LineWindow[] windows = Evaluate(TestLine.Line(), Readings(change: (signal, hour) => signal == "FF" && hour >= 6 ? 1.1 : 1));
        int step = 6 * 12;
        Mostly(true, windows[..step]);
        Assert.All(windows[(step + 1)..(step + 5)], window => Assert.False(window.Steady));
        Mostly(true, windows[(step + 8)..]);
    }

    [Fact]
    public void ShiftedReadings_HaveTheSameVerdicts()
    {
        // Everything a day later: the same grid, the same answer, to the bit.
        Dictionary<string, ReadingSeries> readings = Readings(change: (signal, hour) => signal == "FF" && hour is >= 6 and < 9 ? 1.1 : 1);
        Dictionary<string, ReadingSeries> later = readings.ToDictionary(pair => pair.Key, pair =>
        {
            var series = new ReadingSeries();
            for (int i = 0; i < pair.Value.Count; i++) series.Add(new Reading(pair.Value.At[i] + Milliseconds.Day, pair.Value.Value[i], pair.Value.Quality[i]));
            return series;
        });
        LineWindow[] one = Evaluate(TestLine.Line(), readings), other = Evaluate(TestLine.Line(), later, Day + Milliseconds.Day);
        Assert.Contains(one, window => window.Steady == false);
        Assert.Equal(one.SelectMany(window => window.Effects), other.SelectMany(window => window.Effects.Select(effect => effect with { At = effect.At - Milliseconds.Day })));
    }

    [Fact]
    public void SpanEvaluatedAlone_HasTheVerdictsOfTheDay()
    {
        Dictionary<string, ReadingSeries> readings = Readings(change: (signal, hour) => signal == "FF" && hour is >= 6 and < 7 ? 1.1 : 1);
        LineEvaluation evaluation = Evaluation(TestLine.Line());
        LineWindow[] day = Evaluate(TestLine.Line(), readings);
        long from = Day + (7 * Milliseconds.Hour);
        LineWindow[] part = evaluation.Evaluate(From(readings, from - (long)evaluation.LeadIn.TotalMilliseconds), from, from + Milliseconds.Hour, LineLog.Empty);
        Assert.Equal(day[84..96].SelectMany(window => window.Effects), part.SelectMany(window => window.Effects));
    }

    [Fact]
    public void FeedAfterAStopWithoutProduct_IsFillingUntilProductFlows()
    {
        Line line = TestLine.Line() with { ProducingAboveFeedFlow = 5, Product = new LiquorStream { Flow = TestLine.Instrument("PF", TestLine.Flow) } };
        LineWindow[] windows = Evaluate(line, Readings(
            change: (signal, hour) => (signal == "FF" && hour is >= 3 and < 4) || (signal == "PF" && hour is >= 3 and < 4.5) ? 0 : 1, more: ("PF", 12)));
        Assert.All(windows[36..48], window => Assert.Equal(RunningState.Idle, window.State));
        Assert.All(windows[48..54], window => Assert.Equal(RunningState.Filling, window.State));
        Assert.All(windows[54..], window => Assert.Equal(RunningState.Producing, window.State));
        // Without a stop before it, a closed product valve is no filling.
        windows = Evaluate(line, Readings(change: (signal, hour) => signal == "PF" && hour is >= 3 and < 4.5 ? 0 : 1, more: ("PF", 12)));
        Assert.All(windows, window => Assert.Equal(RunningState.Producing, window.State));
    }

    [Fact]
    public void FeedAfterAStopWithoutAProductMeter_IsFillingUntilSomethingIsConcentrated()
    {
        Line line = TestLine.Line() with { ProducingAboveFeedFlow = 5, Product = new LiquorStream { Solids = TestLine.Instrument("PX", TestLine.Share) } };
        LineWindow[] windows = Evaluate(line, Readings(
            change: (signal, hour) => signal == "FF" && hour is >= 3 and < 4 ? 0 : signal == "PX" && hour is >= 3 and < 5 ? 0.4 : 1, more: ("PX", 0.165)));
        Assert.All(windows[48..60], window => Assert.Equal(RunningState.Filling, window.State));
        Assert.All(windows[60..], window => Assert.Equal(RunningState.Producing, window.State));
    }

    [Fact]
    public void SignalOfACleaning_MarksTheEffectsOfItsGroupAndUnsettlesTheLine()
    {
        Line line = TestLine.Line() with
        {
            CleaningGroups = [new CleaningGroup("circuit", ["E2"], null, null) { Signal = new ActiveSignal(TestLine.Instrument("CIP", Number), Comparison.Above, 0.5) }],
        };
        LineWindow[] windows = Evaluate(line, Readings(change: (signal, hour) => signal == "CIP" && hour is < 3 or >= 5 ? 0 : 1, more: ("CIP", 1)));
        Assert.All(windows[36..60], window => Assert.Equal((RunningState.Producing, RunningState.Cleaning), (window.Effects[0].State, window.Effects[1].State)));
        Assert.All(windows[36..60], window => Assert.False(window.Effects[1].Steady));
        // At its begin and end the whole line is disturbed, for the window and 20 minutes more; between them E1 boils on.
        Assert.All([.. windows[36..41], .. windows[60..65]], window => Assert.False(window.Effects[0].Steady));
        Mostly(true, [.. windows[..36], .. windows[41..60], .. windows[65..]]);
    }

    [Fact]
    public void LoggedCleaning_UnsettlesTheLineAtItsBeginAndEnd()
    {
        LineLog log = LineLog.Empty with { Cleanings = new[] { 0 }.ToLookup(_ => "E2", _ => (Day + (3 * Milliseconds.Hour), Day + (5 * Milliseconds.Hour))) };
        LineWindow[] windows = Evaluation(TestLine.Line()).Evaluate(Readings(), Day, Day + (12 * Milliseconds.Hour), log);
        Assert.All([.. windows[36..41], .. windows[60..65]], window => Assert.False(window.Effects[0].Steady));
        Mostly(true, [.. windows[..36], .. windows[41..60], .. windows[65..]]);
        Assert.All(windows[36..65], window => Assert.False(window.Effects[1].Steady));
    }

    [Fact]
    public void ChangeOfTheProduct_UnsettlesTheLine()
    {
        Line line = TestLine.Line() with
        {
            Liquor = new LiquorChoice(null, TestLine.Instrument("L", Number), new Dictionary<int, Liquor> { [1] = TestLine.Liquor, [2] = TestLine.Liquor }),
        };
        LineWindow[] windows = Evaluate(line, Readings(change: (signal, hour) => signal == "L" && hour >= 4 ? 2 : 1, more: ("L", 1)));
        Assert.All(windows[48..53], window => Assert.False(window.Steady));
        Mostly(true, [.. windows[..48], .. windows[53..]]);
    }

    [Fact]
    public void TankOfKnownHoldUp_SettlesInThreeResidenceTimes()
    {
        // 24 t at 20 kg/s are 20 minutes: the change of the product below unsettles the line for an hour.
        Line line = TestLine.Line() with
        {
            Tanks = [new Tank("T", "E2", 24_000, null)],
            Liquor = new LiquorChoice(null, TestLine.Instrument("L", Number), new Dictionary<int, Liquor> { [1] = TestLine.Liquor, [2] = TestLine.Liquor }),
        };
        LineWindow[] windows = Evaluate(line, Readings(change: (signal, hour) => signal == "L" && hour >= 4 ? 2 : 1, more: ("L", 1)));
        Assert.All(windows[48..60], window => Assert.False(window.Steady));
        Assert.True(windows[62].Steady);
    }

    /// <summary>Of a hundred windows of noise alone one or two are called not steady.</summary>
    private static void Mostly(bool steady, LineWindow[] windows) =>
        Assert.True(windows.Count(window => window.Steady == steady) >= 0.95 * windows.Length, $"{windows.Count(window => window.Steady == steady)} of {windows.Length}");

    private static LineWindow[] Evaluate(Line line, Dictionary<string, ReadingSeries> readings, long day = Day) =>
        Evaluation(line).Evaluate(readings, day, day + (12 * Milliseconds.Hour), LineLog.Empty);

    private static LineEvaluation Evaluation(Line line) =>
        new(new Site { Name = "site", TimeZone = "UTC", Atmosphere = new(101_325, null), HistoryFrom = DateTimeOffset.UnixEpoch, Lines = [line] }, line);

    /// <summary>Readings by the minute with a noise, as a share of the value; bare numbers have none.</summary>
    private static Dictionary<string, ReadingSeries> Readings(Func<string, double, double>? change = null, double noise = 0.001, params (string Signal, double Value)[] more)
    {
        var gaussian = new Gaussian(1);
        var readings = new Dictionary<string, ReadingSeries>();
        foreach ((string signal, double value) in TestLine.Values.Select(pair => (pair.Key, pair.Value)).Concat(more))
        {
            ReadingSeries series = readings[signal] = new ReadingSeries();
            double of = signal is "L" or "CIP" ? 0 : noise;
            for (long at = Day - Milliseconds.Day + 17_000; at < Day + (12 * Milliseconds.Hour); at += Milliseconds.Minute)
                series.Add(new Reading(at, value * (change?.Invoke(signal, (at - Day) / (double)Milliseconds.Hour) ?? 1) * (1 + (of * gaussian.Next())), Quality.Good));
        }

        return readings;
    }

    private static Dictionary<string, ReadingSeries> From(Dictionary<string, ReadingSeries> readings, long from) => readings.ToDictionary(pair => pair.Key, pair =>
    {
        var series = new ReadingSeries();
        for (int i = pair.Value.IndexFrom(from); i < pair.Value.Count; i++) series.Add(new Reading(pair.Value.At[i], pair.Value.Value[i], pair.Value.Quality[i]));
        return series;
    });
}
