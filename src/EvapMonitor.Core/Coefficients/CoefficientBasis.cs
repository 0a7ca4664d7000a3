using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Coefficients;

/// <summary>On what the coefficient of an effect rests before any reading came: found at a typical state of the line with every instrument at its stated accuracy.</summary>
/// <param name="Effect">Name of the effect.</param>
/// <param name="RelativeStandard">Expected standard uncertainty of the coefficient, as a share of it; null when it does not follow from the instruments, or is too uncertain.</param>
/// <param name="TooUncertain">True when it follows, but with more than a quarter of uncertainty.</param>
/// <param name="RestsOn">Signals and stated quantities with their share of the variance, largest first; those under 3 % are left out.</param>
/// <param name="OneMore">Single instruments that would make the coefficient known or clearly surer, with the uncertainty they would bring, best first.</param>
public sealed record CoefficientBasis(
    string Effect, double? RelativeStandard, bool TooUncertain, IReadOnlyList<(string Name, double Share)> RestsOn, IReadOnlyList<(string Instrument, double RelativeStandard)> OneMore)
{
    /// <summary>An instrument must shrink the uncertainty below this share of it to be worth a word.</summary>
    private const double ClearlySurer = 0.85;

    private const double LeastShare = 0.03;

    /// <summary>Looks through one line.</summary>
    /// <param name="line">The line.</param>
    /// <param name="liquor">The liquor it boils.</param>
    /// <param name="usual">Accuracy of an instrument that is not there yet, by its unit.</param>
    public static IReadOnlyList<CoefficientBasis> Of(Line line, Properties.Liquor liquor, Func<UnitOfMeasure, Accuracy> usual)
    {
        ArgumentNullException.ThrowIfNull(line);
        ArgumentNullException.ThrowIfNull(usual);
        IReadOnlyList<OneMoreInstrument> candidates = OneMoreInstrument.For(line, usual);
        double[] typical = TypicalState(candidates.Aggregate(line, (so, one) => one.On(so)), liquor);
        Found now = At(line, liquor, typical);
        (OneMoreInstrument Candidate, Found Found)[] others = [.. candidates.Select(one => (one, At(one.On(line), liquor, typical)))];
        return [.. line.Effects.Select((effect, i) =>
        {
            double own = now.Relative[i] ?? double.PositiveInfinity;
            bool known = own <= ApparentCoefficients.LargestUncertainty;
            IEnumerable<(string, double)> better = others.Where(other => other.Found.Relative[i] is { } with && with <= ApparentCoefficients.LargestUncertainty && with < ClearlySurer * own)
                .Select(other => (other.Candidate.Name, other.Found.Relative[i]!.Value)).OrderBy(other => other.Item2).Take(3);
            return new CoefficientBasis(effect.Name, known ? own : null, now.Relative[i] is not null && !known, now.RestsOn[i], [.. better]);
        })];
    }

    private sealed record Found(double?[] Relative, IReadOnlyList<(string Name, double Share)>[] RestsOn);

    /// <summary>A state in which the equations hold, near what a line is usually like.</summary>
    private static double[] TypicalState(Line line, Properties.Liquor liquor)
    {
        var instruments = new LineInstruments(line);
        var balance = new Reconciliation(instruments, LineGraph.OfSurfaces(line), liquor);
        var inputs = new LineInputs(instruments);
        balance.Typical(inputs);
        double[] systematic = Accuracies(instruments, inputs), none = new double[systematic.Length];
        balance.Solve(inputs, systematic, none, (0, 0));
        return [.. balance.State];
    }

    private static Found At(Line line, Properties.Liquor liquor, double[] typical)
    {
        var instruments = new LineInstruments(line);
        var balance = new Reconciliation(instruments, LineGraph.OfSurfaces(line), liquor);
        var inputs = new LineInputs(instruments);
        balance.ReadFrom(typical, inputs);
        double[] systematic = Accuracies(instruments, inputs), none = new double[systematic.Length];
        var found = new Found(new double?[line.Effects.Count], [.. line.Effects.Select(_ => Array.Empty<(string, double)>())]);
        if (!balance.Solve(inputs, systematic, none, (Conditioning.LineConditioning.WeatherStandard, 0))) return found;
        var quantities = new BalanceQuantities(balance);
        for (int i = 0; i < line.Effects.Count; i++)
        {
            Measured coefficient = quantities.Coefficient(balance.Variables.Effects[i], line.Effects[i].Area);
            if (!coefficient.IsPresent || !(coefficient.Value > 0)) continue;
            found.Relative[i] = coefficient.Standard / coefficient.Value;
            found.RestsOn[i] = [.. quantities.LastShares().Where(one => one.Share >= LeastShare).OrderByDescending(one => one.Share)];
        }

        return found;
    }

    private static double[] Accuracies(LineInstruments instruments, LineInputs inputs) =>
        [.. instruments.All.Select((instrument, place) => double.IsNaN(inputs.Value[place]) ? double.NaN : instrument.Accuracy.Standard(AsSeen(instrument, inputs.Value[place])))];

    private static double AsSeen(Instrument instrument, double value) => instrument.Unit.Dimension switch
    {
        Dimension.Temperature => value - 273.15,
        Dimension.Pressure when instrument.Unit.Reference != PressureReference.Absolute => value - 101_325,
        _ => value,
    };
}
