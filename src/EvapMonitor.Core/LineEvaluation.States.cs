using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core;

/// <content>What the line was doing in a window, and whether it was steady.</content>
public sealed partial class LineEvaluation
{
    /// <summary>A line that takes longer to let product out after a stop is taken for producing.</summary>
    private static readonly TimeSpan LongestFilling = TimeSpan.FromHours(4);

    /// <summary>Product flows when it is more than this share of the feed: the zero of a flow meter is not sharp.</summary>
    private const double FlowingShare = 0.02;

    /// <summary>Residence times after which a change has passed through all but a twentieth (e⁻³).</summary>
    private const double SettlingInResidenceTimes = 3;

    private readonly TimeSpan _lookBack;

    /// <summary>Liquor that the line holds, kg; 0 where nothing is said of it.</summary>
    private double LineHoldUp => _line.Tanks.Sum(tank => tank.HoldUp ?? 0) + _line.Effects.Sum(effect => effect.HoldUp ?? 0);

    private TimeSpan LongestSettling => _line.SettlingTime ?? (LineHoldUp > 0 ? Line.LongestSettlingTime : Line.LeastSettlingTime);

    /// <summary>Signals that no balance needs: the atmosphere's, and those that tell of cleanings.</summary>
    private static IEnumerable<Instrument> Beside(Site site, Line line) =>
        line.CleaningGroups.Select(group => group.Signal?.Instrument).Prepend(site.Atmosphere.Measured).OfType<Instrument>();

    /// <summary>The signals by which a line is steady or not: feed flow, heating steam, last vapours, product solids. −1 is absent.</summary>
    private IEnumerable<int> KeyPlaces(LineGraph graph)
    {
        yield return _instruments.Feed.Flow;
        int chest = graph.Heating.Where(way => way.From == LineGraph.Steam).Select(way => _instruments.Effects[way.To].ChestPressure).FirstOrDefault(place => place >= 0, -1);
        // Behind the valve is what the line sees.
        yield return _line.Steam.PressureAt == SteamGaugePlace.Chest || chest < 0 ? _instruments.SteamPressure : chest;
        for (int i = 0; i < _line.Effects.Count; i++)
        {
            if (graph.ToCondenser[i]) yield return _instruments.Effects[i].VapourPressure;
        }

        yield return _instruments.Product.Solids;
    }

    private IEnumerable<SwitchingSignal> Switches()
    {
        if (_instruments.LiquorSignal >= 0) yield return new SwitchingSignal(_instruments.LiquorSignal, value => (int)double.Round(double.Clamp(value, -1e9, 1e9)));
        foreach (ActiveSignal active in _line.Bodies.SelectMany(body => body.Serves.Values).Concat(_line.CleaningGroups.Select(group => group.Signal).OfType<ActiveSignal>()))
            yield return new SwitchingSignal(PlaceOf(active), value => active.IsActive(value) ? 1 : 0);
    }

    private int PlaceOf(ActiveSignal active)
    {
        for (int place = 0; place < _conditioned.Count; place++)
        {
            if (_conditioned[place].Signal == active.Instrument.Signal) return place;
        }

        throw new InvalidOperationException($"{active.Instrument.Signal} is not among the instruments of the line.");
    }

    private Liquor? LiquorOf(LineInputs inputs)
    {
        if (_line.Liquor.Always is { } always) return always;
        double value = inputs.At(_instruments.LiquorSignal);
        return double.IsFinite(value) && _line.Liquor.ByValue.TryGetValue((int)double.Round(value), out Liquor? found) ? found : null;
    }

    private RunningState StateOf(LineMemory memory, long at, LineInputs inputs, Liquor? liquor)
    {
        double feed = MassFlow(_instruments.Feed.Flow, inputs.At(_instruments.Feed.Flow));
        if (double.IsNaN(feed)) return RunningState.Unknown;
        if (feed <= (_line.ProducingAboveFeedFlow ?? 0)) return RunningState.Idle;
        if (liquor is Water) return RunningState.WaterRun;
        return IsFilling(memory, (int)((at - memory.Grid.Start) / memory.Grid.Step)) ? RunningState.Filling : RunningState.Producing;
    }

    /// <summary>
    /// True when feed has flowed since the line last stood and no product has left in all that time: no flow of product, or, where its flow is not measured,
    /// nothing more concentrated than the feed.
    /// </summary>
    private bool IsFilling(LineMemory memory, int window)
    {
        double Mean(int place, int at)
        {
            if (place < 0) return double.NaN;
            ref readonly WindowPartial partial = ref memory.Partials[place][at];
            return partial.GoodTime < SignalConditioning.MinimumGoodShare * memory.Grid.Step ? double.NaN : partial.Weighted / partial.GoodTime;
        }

        (StreamPlaces feed, StreamPlaces product) = (_instruments.Feed, _instruments.Product);
        for (int at = window; at >= int.Max(0, window - (int)(LongestFilling / _site.Window)); at--)
        {
            double flow = MassFlow(feed.Flow, Mean(feed.Flow, at));
            if (flow <= (_line.ProducingAboveFeedFlow ?? 0)) return true;
            bool none = product.Flow >= 0
                ? MassFlow(product.Flow, Mean(product.Flow, at)) <= FlowingShare * flow
                : Mean(product.Solids, at) <= Mean(feed.Solids, at);
            if (!none) return false;
        }

        return false;
    }

    /// <summary>A flow as mass; a volume counts as that of water, which is near enough to tell whether anything flows.</summary>
    private double MassFlow(int place, double flow) => place >= 0 && _instruments.All[place].Unit.Dimension == Dimension.VolumeFlow ? 1000 * flow : flow;

    private bool? SteadyOf(LineSteadiness steadiness, long at, LineInputs inputs, LineLog log)
    {
        long settling = (long)SettlingTime(inputs).TotalMilliseconds, end = at + (long)_site.Window.TotalMilliseconds;
        bool Lately(long instant) => instant >= at - settling && instant < end;
        // An effect that is taken out of the line or put back disturbs all of them; one that is out does not.
        if (log.Cleanings.Any(effect => effect.Any(cleaning => Lately(cleaning.Start) || Lately(cleaning.End)))) return false;
        return steadiness.Of(at, settling);
    }

    private TimeSpan SettlingTime(LineInputs inputs)
    {
        if (_line.SettlingTime is { } given) return given;
        double feed = MassFlow(_instruments.Feed.Flow, inputs.At(_instruments.Feed.Flow));
        if (LineHoldUp == 0 || !(feed > 0)) return Line.LeastSettlingTime;
        double seconds = SettlingInResidenceTimes * LineHoldUp / feed;
        return TimeSpan.FromSeconds(double.Clamp(seconds, Line.LeastSettlingTime.TotalSeconds, Line.LongestSettlingTime.TotalSeconds));
    }

    /// <summary>Writes into a window whether it was steady, what boiled on which surface, and marks the effects that were being cleaned: by the log, or by the signal of their group.</summary>
    private LineWindow Marked(LineWindow window, bool? steady, LineMemory memory, LineInputs inputs, LineLog log)
    {
        int index = (int)((window.At - memory.Grid.Start) / memory.Grid.Step);
        long end = window.At + memory.Grid.Step;
        bool Signalled(CleaningGroup group)
        {
            if (group.Signal is not { } signal) return false;
            ref readonly WindowPartial partial = ref memory.Partials[PlaceOf(signal)][index];
            return partial.GoodTime > 0 && (signal.IsActive(partial.Lowest) || signal.IsActive(partial.Highest));
        }

        bool IsCleaned(string effect) => log.Cleanings[effect].Any(cleaning => window.At < cleaning.End && end > cleaning.Start)
            || _line.CleaningGroups.Any(group => group.Effects.Contains(effect) && Signalled(group));
        string? product = LiquorOf(inputs)?.Name;
        double feed = MassFlow(_instruments.Feed.Flow, inputs.At(_instruments.Feed.Flow));
        return window with
        {
            Steady = steady,
            Effects = [.. window.Effects.Select((effect, i) =>
            {
                bool cleaned = IsCleaned(_line.Effects[i].Name);
                return effect with
                {
                    State = cleaned ? RunningState.Cleaning : effect.State, Steady = cleaned ? false : steady, Product = product, FeedFlow = feed,
                    Bodies = _instruments.Surfaces[i].NamesAt(inputs),
                };
            })],
        };
    }
}
