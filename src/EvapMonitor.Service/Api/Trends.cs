using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Api;

/// <summary>Makes a series for a chart: windows for short spans, hours for long ones, thinned so that the extremes stay.</summary>
public sealed class Trends(TrendStore store, SurfaceStore cleanHours, SurfaceStates surfaces)
{
    /// <summary>Spans over this come by the hour.</summary>
    public static readonly TimeSpan LongestByWindow = TimeSpan.FromDays(10);

    /// <summary>Longest span of one request.</summary>
    public static readonly TimeSpan LongestSpan = TimeSpan.FromDays(3660);

    /// <summary>Quantities with their units and how each is taken from a window and from the hours.</summary>
    internal static readonly IReadOnlyDictionary<string, TrendQuantity> Quantities = new Dictionary<string, TrendQuantity>
    {
        ["coefficient"] = new("W/(m2.K)", HourQuantity.Coefficient, (value, _, _) => value),
        ["clean_coefficient"] = new("W/(m2.K)", HourQuantity.Coefficient, (_, _, clean) => clean is null ? Measured.Absent : new Measured(clean.Coefficient, 0, 0)) { Compared = one => one.CleanCoefficient },
        ["cleanliness"] = new("1", HourQuantity.Coefficient, (value, _, clean) => CleanComparison.Cleanliness(value, clean)) { Compared = one => one.Cleanliness },
        ["fouling_resistance"] = new("m2.K/W", HourQuantity.Coefficient, (value, _, clean) => CleanComparison.Resistance(value, clean)) { Compared = one => one.Resistance },
        ["coefficient_at_reference"] = new("W/(m2.K)", HourQuantity.Coefficient, (_, _, _) => Measured.Absent) { Compared = one => one.AtReference },
        ["driving_force"] = new("K", HourQuantity.DrivingForce, (value, _, _) => value),
        ["head_corrected_driving_force"] = new("K", HourQuantity.HeadCorrectedDrivingForce, (value, _, _) => value),
        ["duty"] = new("kW", HourQuantity.Duty, (value, _, _) => Scaled(value, 1e-3)),
        ["heat_flux"] = new("kW/m2", HourQuantity.HeatFlux, (value, _, _) => Scaled(value, 1e-3)),
        ["heating_temperature"] = new("degC", HourQuantity.HeatingTemperature, (value, _, _) => value with { Value = value.Value - 273.15 }),
        ["boiling_temperature"] = new("degC", HourQuantity.BoilingTemperature, (value, _, _) => value with { Value = value.Value - 273.15 }),
        ["elevation"] = new("K", HourQuantity.Elevation, (value, _, _) => value),
        ["solids"] = new("%", HourQuantity.Solids, (value, _, _) => new Measured(value.Value * 100, double.NaN, double.NaN)),
        ["feed_flow"] = new("kg/s", HourQuantity.FeedFlow, (value, _, _) => new Measured(value.Value, double.NaN, double.NaN)),
    };

    /// <summary>One series.</summary>
    /// <param name="line">The line.</param>
    /// <param name="effect">The effect in time.</param>
    /// <param name="name">Name of the quantity.</param>
    /// <param name="from">Begin of the span.</param>
    /// <param name="to">Its end.</param>
    /// <param name="points">Wanted number of points.</param>
    /// <param name="revision">Results of this plant revision, where they still stand; null: those that are shown. Its windows may be gone: then the hours tell.</param>
    /// <param name="dataVersion">Version of the line's results.</param>
    /// <param name="stop">Cancels.</param>
    internal async Task<TrendWire> OfAsync(
        LinePlace line, EffectInTime effect, string name, DateTimeOffset from, DateTimeOffset to, int points, int? revision, long dataVersion, CancellationToken stop)
    {
        TrendQuantity quantity = Quantities[name];
        bool byHour = to - from > LongestByWindow;
        IReadOnlyList<EffectWindow> windows = byHour ? [] : store.Windows(line.LineId, effect.EffectId, from, to, revision);
        byHour |= revision is not null && windows.Count == 0;
        // What the surfaces are held against is computed from what is shown; an earlier revision is held against its own design values.
        CleanInTime? clean = quantity.Compared is null || revision is not null ? null : await surfaces.CleanAsync(line.LineId, effect.EffectId, effect.Now.Name, from, to, stop);
        if (clean is { Surfaces.Count: > 0 }) return Wire(line, effect.Now, name, quantity.Unit, byHour, Step(byHour, effect), Thin(WithGaps(Compared(line, effect, quantity, clean, byHour, windows, from, to), Step(byHour, effect)), points), from, dataVersion);
        List<Point> all = byHour
            ? [.. store.Hours(line.LineId, effect.EffectId, quantity.Hours, from, to, revision).Select(hour =>
            {
                (Effect then, CleanExpectation? design) = effect.At(hour.Hour);
                return new Point(hour.Hour, quantity.From(hour.Mean, then, design), "", null, null);
            })]
            : [.. windows.Select(one => PointOf(one, quantity, effect))];
        long step = Step(byHour, effect);
        return Wire(line, effect.Now, name, quantity.Unit, byHour, step, Thin(WithGaps(all, step), points), from, dataVersion);
    }

    private static long Step(bool byHour, EffectInTime effect) => byHour ? Milliseconds.Hour : (long)effect.LongestWindow.TotalMilliseconds;

    private List<Point> Compared(
        LinePlace line, EffectInTime effect, TrendQuantity quantity, CleanInTime clean, bool byHour, IReadOnlyList<EffectWindow> windows, DateTimeOffset from, DateTimeOffset to) => byHour
        ? [.. cleanHours.Hours(line.LineId, effect.EffectId, from, to).Select(hour => hour.Clean)
            .Select(hour => new Point(hour.Hour, quantity.Compared!(new(hour.CleanCoefficient, hour.Cleanliness, hour.Resistance, hour.AtReference, hour.Clamped)), hour.Clamped ? "extrapolated" : "", null, null))]
        : [.. windows.Select(window =>
        {
            CleanComparisonResult found = clean.Compare(window);
            Measured value = quantity.Compared!(found);
            bool producing = window.State is RunningState.Producing or RunningState.Unknown;
            string? reason = value.IsPresent ? null : window.Reason ?? clean.At(window.At)?.Reference?.Source ?? "no clean expectation";
            return new Point(window.At, producing ? value : Measured.Absent, producing ? found.Clamped || window.Extrapolated ? "extrapolated" : "" : "not producing", producing ? reason : window.Reason, window.Steady);
        })];

    private static Measured Scaled(Measured value, double factor) => new(value.Value * factor, value.Systematic * factor, value.Random * factor);

    private static Point PointOf(EffectWindow window, TrendQuantity quantity, EffectInTime effect)
    {
        (Effect then, CleanExpectation? clean) = effect.At(window.At);
        Measured value = quantity.From(EffectHour.Of(window, quantity.Hours), then, clean);
        bool producing = window.State is RunningState.Producing or RunningState.Unknown;
        return new Point(window.At, value, producing ? window.Extrapolated ? "extrapolated" : "" : "not producing", value.IsPresent ? null : window.Reason, window.Steady);
    }

    /// <summary>Where steps are missing altogether, one absent point breaks the line.</summary>
    private static List<Point> WithGaps(List<Point> points, long step)
    {
        var result = new List<Point>(points.Count);
        foreach (Point point in points)
        {
            if (result.Count > 0 && point.At - result[^1].At > step) result.Add(new Point(result[^1].At + step, Measured.Absent, "", "no readings", null));
            result.Add(point);
        }

        return result;
    }

    /// <summary>
    /// Thins to about the wanted number: from each stretch the lowest, the highest and the first absent point stay, so that a spike or a gap never vanishes.
    /// </summary>
    private static List<Point> Thin(List<Point> points, int wanted)
    {
        if (points.Count <= wanted) return points;
        var result = new List<Point>(wanted + 8);
        int stretches = int.Max(1, wanted / 3);
        for (int stretch = 0; stretch < stretches; stretch++)
        {
            int first = (int)((long)points.Count * stretch / stretches), end = (int)((long)points.Count * (stretch + 1) / stretches);
            int low = -1, high = -1, gap = -1;
            for (int i = first; i < end; i++)
            {
                if (!points[i].Value.IsPresent)
                {
                    gap = gap < 0 ? i : gap;
                    continue;
                }

                if (low < 0 || points[i].Value.Value < points[low].Value.Value) low = i;
                if (high < 0 || points[i].Value.Value > points[high].Value.Value) high = i;
            }

            foreach (int i in new[] { low, high, gap }.Where(i => i >= 0).Distinct().Order()) result.Add(points[i]);
        }

        return result;
    }

    private static TrendWire Wire(
        LinePlace line, Effect effect, string name, string unit, bool byHour, long step, List<Point> points, DateTimeOffset from, long dataVersion)
    {
        DateTimeOffset start = points.Count > 0 ? DateTimeOffset.FromUnixTimeMilliseconds(points[0].At) : from;
        long zero = start.ToUnixTimeMilliseconds();
        var reasons = new List<string>();
        int IndexOf(string? reason)
        {
            if (reason is null) return -1;
            if (!reasons.Contains(reason)) reasons.Add(reason);
            return reasons.IndexOf(reason);
        }

        return new TrendWire(
            line.Line.Name, effect.Name, name, unit, byHour ? "hour" : "window", (int)(step / 1000), start,
            [.. points.Select(point => (point.At - zero) / 1000)],
            [.. points.Select(point => Number(point.Value.Value))],
            [.. points.Select(point => Number(point.Value.Standard))],
            [.. points.Select(point => Number(point.Value.Random))],
            [.. points.Select(point => point.Mark)],
            [.. points.Select(point => point.Steady)],
            reasons,
            [.. points.Select(point => IndexOf(point.Reason))],
            dataVersion);
    }

    private static double? Number(double value) => double.IsFinite(value) ? double.Round(value, 12) : null;

    private readonly record struct Point(long At, Measured Value, string Mark, string? Reason, bool? Steady);
}

/// <summary>A quantity that can be charted.</summary>
/// <param name="Unit">Unit in which it goes out.</param>
/// <param name="Hours">The stored quantity it rests on.</param>
/// <param name="From">How it follows from that.</param>
internal sealed record TrendQuantity(string Unit, HourQuantity Hours, Func<Measured, Effect, CleanExpectation?, Measured> From)
{
    /// <summary>How it follows from holding a coefficient against what it would be if clean; null for what does not.</summary>
    public Func<CleanComparisonResult, Measured>? Compared { get; init; }
}
