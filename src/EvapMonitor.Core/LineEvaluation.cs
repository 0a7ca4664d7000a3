using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core;

/// <summary>
/// The journey of a reading through the stations, for one line: readings → conditioned windows → reconciled balance → apparent coefficients.
/// The result for a UTC day is a pure function of the plant, the day's readings, those of the lead-in before it, and the logged cleanings.
/// </summary>
public sealed partial class LineEvaluation
{
    /// <summary>Raised when a change to the computation may move figures; stored with every result.</summary>
    public const int ModelNumber = 5;

    private readonly Site _site;
    private readonly Line _line;
    private readonly LineInstruments _instruments;
    private readonly IReadOnlyList<Instrument> _conditioned;
    private readonly ApparentCoefficients _coefficients;
    private readonly IReadOnlyList<Instrument> _keys;
    private readonly IReadOnlyList<SwitchingSignal> _switches;

    /// <summary>Prepares the evaluation of a line. Not for use by two threads at a time.</summary>
    public LineEvaluation(Site site, Line line)
    {
        _site = site;
        _line = line;
        _instruments = new LineInstruments(line);
        _conditioned = [.. _instruments.All.Concat(Beside(site, line)).DistinctBy(instrument => instrument.Signal)];
        var graph = LineGraph.OfSurfaces(line);
        _coefficients = new ApparentCoefficients(_instruments, graph);
        _keys = [.. KeyPlaces(graph).Where(place => place >= 0).Distinct().Select(place => _instruments.All[place])];
        _switches = [.. Switches()];
        _lookBack = Longer(LongestSettling + LineSteadiness.LookBack, LongestFilling) + site.Window;
        TimeSpan stale = _conditioned.Select(instrument => instrument.StaleAfter).DefaultIfEmpty().Max();
        TimeSpan still = _conditioned.Select(instrument => instrument.FrozenAfter).DefaultIfEmpty().Max();
        TimeSpan laboratory = LaboratoryPlaces().Select(place => place.ValidFor).DefaultIfEmpty().Max();
        LongestStale = stale;
        Reach = Longer(Longer(stale + Longer(still, TimeSpan.FromHours(1)), laboratory) + line.SuspectAfter, stale + _lookBack);
        LeadIn = Longer(Longer(LineConditioning.Memory + stale, laboratory) + line.SuspectAfter, stale + _lookBack) + site.Window;
    }

    /// <summary>The signals that the line needs, the atmosphere's among them.</summary>
    public IEnumerable<string> Signals => _conditioned.Select(instrument => instrument.Signal);

    /// <summary>Those of them that are laboratory values, whose samples stand for hours.</summary>
    public IEnumerable<string> LaboratorySignals => LaboratoryPlaces().Select(place => _instruments.All[place.Place].Signal);

    /// <summary>How far before a span its readings must reach.</summary>
    public TimeSpan LeadIn { get; }

    /// <summary>How long after its instant a reading may still move a result.</summary>
    public TimeSpan Reach { get; }

    /// <summary>How long the last reading of a signal is carried forward at most, so that windows without any reading of their own have a result.</summary>
    public TimeSpan LongestStale { get; }

    /// <summary>A memory for evaluating this line live.</summary>
    public LineMemory NewMemory() => new(_conditioned, _site.Window, _line.SuspectAfter, _keys, _lookBack);

    /// <summary>Evaluates the windows of a span from readings alone.</summary>
    /// <param name="readings">Readings by signal, from <see cref="LeadIn"/> before the span on.</param>
    /// <param name="from">Start of the span, ms since 1970-01-01T00:00:00Z; on the window grid.</param>
    /// <param name="to">End of the span; on the window grid.</param>
    /// <param name="log">What people have logged.</param>
    public LineWindow[] Evaluate(
        IReadOnlyDictionary<string, ReadingSeries> readings, long from, long to, LineLog log) =>
        Evaluate(NewMemory(), readings, from, to, log);

    /// <summary>Evaluates the windows of a span with what a memory knows already; the result has the same bits as without.</summary>
    /// <param name="memory">Made by <see cref="NewMemory"/>; filled here.</param>
    /// <param name="readings">Readings by signal, from <see cref="LongestStale"/> before <see cref="LineMemory.MissingFrom"/>; laboratory values from <see cref="LeadIn"/> before the span.</param>
    /// <param name="from">Start of the span.</param>
    /// <param name="to">End of the span.</param>
    /// <param name="log">As above.</param>
    public LineWindow[] Evaluate(
        LineMemory memory, IReadOnlyDictionary<string, ReadingSeries> readings, long from, long to, LineLog log)
    {
        memory.Fill(readings, from, to);
        // Windows before the span are judged too: an instrument is left out once it has been suspect for long enough.
        WindowGrid grid = WindowGrid.Between(memory.JudgedFrom(from), to, _site.Window);
        memory.Suspicions.Forget(long.MaxValue, grid.Start);
        (ConditionedSignal[] signals, Atmosphere air) = LineConditioning.Condition(_conditioned, memory, _site.Atmosphere, grid);
        foreach ((int place, TimeSpan validFor) in LaboratoryPlaces())
        {
            ReadingSeries samples = readings.TryGetValue(_instruments.All[place].Signal, out ReadingSeries? found) ? found : new ReadingSeries();
            signals[place] = Laboratory.Condition(_instruments.All[place], samples, validFor, grid);
        }

        foreach (ConditionedSignal signal in signals) signal.Exclude(log.Exclusions[signal.Instrument.Signal]);
        var steadiness = new LineSteadiness(memory, _switches);
        var windows = new List<LineWindow>(grid.Count);
        for (int window = 0; window < grid.Count; window++)
        {
            long at = grid.StartOf(window);
            if (at < from && memory.Suspicions.Knows(at)) continue;
            LineInputs inputs = Read(signals, window, out double[] systematic, out double[] random);
            // A window into which no signal reaches has no result, not an absent one.
            if (Array.TrueForAll(inputs.Value, double.IsNaN)) continue;
            Liquor? liquor = LiquorOf(inputs);
            RunningState state = StateOf(memory, at, inputs, liquor);
            if (liquor is null)
            {
                LineWindow absent = LineWindow.Absent(at, state, _line.Effects.Count, $"the product is not known: {_line.Liquor.Signal!.Signal} names none");
                if (at >= from) windows.Add(Marked(absent, SteadyOf(steadiness, at, inputs, log), memory, inputs, log));
                continue;
            }

            var read = new WindowReadings(state, liquor, inputs, systematic, random, (air.Systematic[window], air.Random[window]));
            IReadOnlyList<IReadOnlyList<int>> suspects = _coefficients.Suspects(read);
            // Of several that cannot be told apart none is left out: it might be the sound one.
            if (state != RunningState.Idle) memory.Suspicions.Keep(at, [.. suspects.Where(set => set.Count == 1).Select(set => set[0])]);
            if (at < from) continue;
            int w = window;
            bool? steady = SteadyOf(steadiness, at, inputs, log);
            windows.Add(Marked(_coefficients.Evaluate(at, read, suspects, memory.Suspicions.LeftOutAt(at), place => signals[place].WhyAbsent(w)), steady, memory, inputs, log));
        }

        return [.. windows];
    }

    private LineInputs Read(ConditionedSignal[] signals, int window, out double[] systematic, out double[] random)
    {
        var inputs = new LineInputs(_instruments);
        (systematic, random) = (new double[inputs.Value.Length], new double[inputs.Value.Length]);
        for (int place = 0; place < systematic.Length; place++)
        {
            inputs.Value[place] = signals[place].Mean[window];
            systematic[place] = signals[place].Systematic[window];
            random[place] = signals[place].Random[window];
        }

        for (int i = 0; i < inputs.Heights.Length; i++)
        {
            if (_instruments.Effects[i].Level is >= 0 and var level) inputs.Heights[i] = (inputs.Value[level], systematic[level], random[level]);
        }

        // Of a level that tells what is stored the balance wants to know how fast it rises; a constant error of the level is none of its rate.
        foreach ((int place, _) in _instruments.StoringLevels)
        {
            if (place < 0) continue;
            double rate = inputs.Value[place] = signals[place].Rate[window];
            systematic[place] = HoldUp.MassPerLevelStandard * double.Abs(rate);
            random[place] = signals[place].RateRandom[window];
        }

        return inputs;
    }

    /// <summary>How sound each signal was over a span: what conditioning took and what it left out.</summary>
    /// <param name="readings">Readings by signal, from <see cref="LeadIn"/> before the span on.</param>
    /// <param name="from">Start of the span; on the window grid.</param>
    /// <param name="to">End of the span; on the window grid.</param>
    public IReadOnlyList<SignalSummary> Summarise(IReadOnlyDictionary<string, ReadingSeries> readings, long from, long to)
    {
        LineMemory memory = NewMemory();
        memory.Fill(readings, from, to);
        (ConditionedSignal[] signals, _) = LineConditioning.Condition(_conditioned, memory, _site.Atmosphere, WindowGrid.Between(from, to, _site.Window));
        return [.. signals.Select(SignalSummary.Of)];
    }

    private IEnumerable<(int Place, TimeSpan ValidFor)> LaboratoryPlaces()
    {
        if (_instruments.Feed.Laboratory >= 0) yield return (_instruments.Feed.Laboratory, _line.Feed.LaboratoryValidFor);
        if (_instruments.Product.Laboratory >= 0) yield return (_instruments.Product.Laboratory, _line.Product.LaboratoryValidFor);
    }

    private static TimeSpan Longer(TimeSpan one, TimeSpan other) => one > other ? one : other;
}
