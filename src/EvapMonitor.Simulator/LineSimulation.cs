using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Simulator;

/// <summary>
/// A line as it truly runs: scale grows along the conditions, cleanings take it away, and the line equations give the operating point. Computed in steps of
/// half an hour from the first instant on and joined by straight lines, so that an instant has the same state however far and in which portions it was computed.
/// </summary>
public sealed class LineSimulation
{
    /// <summary>Length of a step, days.</summary>
    private const double StepDays = 1 / 48.0;

    private static readonly long StepMilliseconds = (long)TimeSpan.FromMinutes(30).TotalMilliseconds;

    private readonly DemoLine _story;
    private readonly Line _line;
    private readonly long _start;
    private readonly Func<LineMoment, double>[] _truths;
    private readonly Dictionary<string, double> _resistance, _flux = [], _solids = [];
    private readonly Dictionary<(int Product, string Bodies), Rating> _ratings = [];
    private readonly List<Step> _steps = [];
    private readonly Lock _gate = new();
    private Setting? _setting;
    private LineMoment? _last;
    private (Rating Rating, OperatingPoint Point)? _near;

    /// <summary>Prepares the simulation of a line.</summary>
    /// <param name="story">What happens.</param>
    /// <param name="line">The line as the plant file has it.</param>
    /// <param name="atmosphere">Pa.</param>
    /// <param name="start">The first instant.</param>
    /// <exception cref="NotSupportedException">The line has an instrument of which the story says nothing.</exception>
    public LineSimulation(DemoLine story, Line line, double atmosphere, DateTimeOffset start)
    {
        ArgumentNullException.ThrowIfNull(story);
        ArgumentNullException.ThrowIfNull(line);
        (_story, _line, _start) = (story, line, start.ToUnixTimeMilliseconds());
        Instruments = [.. SiteInstruments.Of(line).DistinctBy(at => at.Instrument.Signal)];
        _truths = [.. Instruments.Select(at => SignalTruth.Of(line, at, atmosphere))];
        _resistance = story.Surfaces.ToDictionary(surface => surface.Name, surface => surface.AtStart);
    }

    /// <summary>The instruments, one for each signal.</summary>
    public IReadOnlyList<InstrumentAtPlace> Instruments { get; }

    /// <summary>Days from the first instant to another.</summary>
    public double DayOf(long at) => (at - _start) / (double)TimeSpan.FromDays(1).TotalMilliseconds;

    /// <summary>Computes on until an instant is reached. Others may read meanwhile what was computed before.</summary>
    /// <exception cref="InvalidOperationException">The story asks for what the line cannot do.</exception>
    public void RunTo(DateTimeOffset end)
    {
        while (_start + (_steps.Count * StepMilliseconds) <= end.ToUnixTimeMilliseconds()) Advance();
    }

    /// <summary>What an instrument would read if it were perfect: SI units, gauge as gauge; NaN where there is nothing to read.</summary>
    /// <param name="instrument">Index in <see cref="Instruments"/>.</param>
    /// <param name="at">The instant, ms since 1970-01-01T00:00:00Z; within what was computed.</param>
    public double TruthAt(int instrument, long at)
    {
        Step step = StepAt(at, out double share);
        double left = step.Left[instrument];
        // A switch has no values in between.
        return Instruments[instrument].Instrument.Unit.Dimension == Dimension.Number ? left : left + (share * (step.Right[instrument] - left));
    }

    /// <summary>The coefficient of an effect as it truly is, W/(m²·K); NaN while the line stands.</summary>
    /// <param name="effect">Index in the plant file.</param>
    /// <param name="at">As above.</param>
    public double CoefficientAt(int effect, long at)
    {
        Step step = StepAt(at, out double share);
        return step.LeftCoefficient[effect] + (share * (step.RightCoefficient[effect] - step.LeftCoefficient[effect]));
    }

    private Step StepAt(long at, out double share)
    {
        long since = at - _start;
        share = since % StepMilliseconds / (double)StepMilliseconds;
        lock (_gate) return _steps[(int)(since / StepMilliseconds)];
    }

    private void Advance()
    {
        double day = _steps.Count * StepDays;
        StoryTime begin = new(day), middle = new(day + (StepDays / 2)), end = new(day + StepDays);
        foreach (SurfaceCleaning cleaning in _story.Cleanings)
        {
            // The first step after its end.
            double since = (middle.OfSeason - cleaning.When.To + StoryTime.Season) % StoryTime.Season;
            if (since < StepDays) _resistance[cleaning.Surface] *= cleaning.Left;
        }

        Setting setting = SettingAt(middle);
        if (setting != _setting || _last is null) (_setting, _last) = (setting, MomentAt(begin, setting));
        LineMoment left = _last;
        if (left.Point is not null) Foul();
        _last = MomentAt(end, setting);
        var step = new Step(Read(left), Read(_last), Coefficients(left), Coefficients(_last));
        lock (_gate) _steps.Add(step);
    }

    private Setting SettingAt(StoryTime time)
    {
        bool stands = _story.Stops.Any(stop => stop.Holds(time.OfSeason));
        string gas = string.Join(' ', _story.Gas.Where(gas => gas.When.Holds(time.OfSeason)).Select(gas => gas.Effect));
        string bodies = _story.BodiesAt(time) is { } serving ? string.Join(' ', serving.Select(pair => $"{pair.Key}={string.Join('+', pair.Value)}")) : "";
        return new(stands, _story.ProductAt(time), bodies, gas, time);
    }

    /// <summary>The line with the setting that holds in a step, at one of the step's ends.</summary>
    private LineMoment MomentAt(StoryTime time, Setting setting)
    {
        IReadOnlyDictionary<string, IReadOnlyList<string>>? bodies = _story.BodiesAt(setting.Middle);
        Dictionary<string, double> gas = _story.Gas.Where(gas => gas.When.Holds(setting.Middle.OfSeason)).ToDictionary(gas => gas.Effect, gas => gas.ColderBy);
        if (setting.Stands) return new(null, setting.Product, bodies, gas);
        Rating rating = RatingOf(setting, bodies);
        // The product of a step is that of its middle: its ends may belong to another.
        StoryTime within = new(time.Day + ((setting.Middle.Day - time.Day) * 1e-6));
        RatingConditions conditions = _story.ConditionsAt(within, CoefficientsNow(setting, bodies));
        RatingResult result = rating.Solve(conditions, Near(rating));
        if (_story.Limited(within, conditions, result.Point) is { } limited) result = rating.Solve(limited, Near(rating));
        OperatingPoint point = result.Point ?? throw new InvalidOperationException($"{_story.Name}, day {time.Day:0.###}: {result.Reason}");
        Remember(point, bodies);
        _near = (rating, point);
        return new(point, setting.Product, bodies, gas);
    }

    private OperatingPoint? Near(Rating rating) => _near is { } near && near.Rating == rating ? near.Point : null;

    private Rating RatingOf(Setting setting, IReadOnlyDictionary<string, IReadOnlyList<string>>? bodies)
    {
        if (_ratings.TryGetValue((setting.Product, setting.Bodies), out Rating? known)) return known;
        var liquor = _line.Liquor.Always ?? _line.Liquor.ByValue[setting.Product];
        return _ratings[(setting.Product, setting.Bodies)] = new Rating(new LineGraph(_line, bodies), new LineProperties(liquor));
    }

    private Dictionary<string, double> CoefficientsNow(Setting setting, IReadOnlyDictionary<string, IReadOnlyList<string>>? bodies)
    {
        var coefficients = new Dictionary<string, double>();
        foreach (Effect effect in _line.Effects)
        {
            double share = _story.Gas.FirstOrDefault(gas => gas.Effect == effect.Name && gas.When.Holds(setting.Middle.OfSeason))?.CoefficientShare ?? 1;
            foreach (string body in bodies?[effect.Name] ?? [effect.Name])
            {
                Surface surface = _story.Surfaces.First(surface => surface.Name == body);
                double solids = setting.IsWater(_line) ? 0 : _solids.GetValueOrDefault(effect.Name, surface.SolidsReference);
                coefficients[body] = share * surface.Coefficient(_resistance[body], solids);
            }
        }

        return coefficients;
    }

    private void Remember(OperatingPoint point, IReadOnlyDictionary<string, IReadOnlyList<string>>? bodies)
    {
        _flux.Clear();
        foreach (EffectPoint effect in point.Effects)
        {
            _solids[effect.Name] = effect.LeavingSolids;
            foreach (string body in bodies?[effect.Name] ?? [effect.Name]) _flux[body] = effect.Duty / effect.Area;
        }
    }

    private void Foul()
    {
        foreach (Surface surface in _story.Surfaces.Where(surface => _flux.ContainsKey(surface.Name)))
            _resistance[surface.Name] = surface.Law.After(_resistance[surface.Name], _flux[surface.Name], StepDays);
    }

    private double[] Read(LineMoment moment) => [.. _truths.Select(truth => truth(moment))];

    private double[] Coefficients(LineMoment moment) => [.. _line.Effects.Select((_, i) => moment.Point?.Effects[i].Coefficient ?? double.NaN)];

    private sealed record Step(double[] Left, double[] Right, double[] LeftCoefficient, double[] RightCoefficient);

    /// <summary>What holds all through a step.</summary>
    private sealed record Setting(bool Stands, int Product, string Bodies, string Gas, StoryTime Middle)
    {
        /// <summary>True when plain water is boiled.</summary>
        public bool IsWater(Line line) => line.Liquor.Always is null && Product == 0;

        /// <summary>Two settings are the same whenever they hold.</summary>
        public bool Equals(Setting? other) => other is not null && (Stands, Product, Bodies, Gas) == (other.Stands, other.Product, other.Bodies, other.Gas);

        public override int GetHashCode() => HashCode.Combine(Stands, Product, Bodies, Gas);
    }
}
