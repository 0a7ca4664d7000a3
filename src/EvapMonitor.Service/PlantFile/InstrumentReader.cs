using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>One signal with unit, accuracy, range and the rest: <c>{signal: N1.PT-2, unit: bar, accuracy: 0.01 abs}</c>.</summary>
internal sealed class InstrumentReader(Findings findings, SignalUse signals)
{
    private static readonly TimeSpan Longest = TimeSpan.FromHours(6);

    private static readonly Dictionary<string, Interpolation> Interpolations = new(StringComparer.Ordinal)
    {
        ["step"] = Interpolation.Step,
        ["linear"] = Interpolation.Linear,
    };

    /// <summary>A plain instrument of one of the dimensions.</summary>
    public Instrument? Read(PlantNode? node, params Dimension[] dimensions) =>
        MappingReader.Open(node, PlantFileKeys.Instrument, findings) is { } mapping ? Read(mapping, dimensions) : null;

    /// <summary>An instrument in a mapping that has keys of its own besides.</summary>
    public Instrument? Read(MappingReader mapping, params Dimension[] dimensions)
    {
        PlantNode? signalNode = mapping.Require("signal", "the name of a signal");
        string? signal = Texts.Text(signalNode, "the name of a signal", findings);
        UnitOfMeasure? unit = Unit(mapping, dimensions);
        if (unit is null) return null;

        (double Low, double High)? range = Range(mapping.Take("range"), unit);
        Accuracy? accuracy = mapping.Take("accuracy") is { } stated
            ? AccuracyReader.Read(stated, unit, range, findings)
            : AssumedAccuracy.For(unit, range);
        var instrument = new Instrument
        {
            Signal = signal ?? "",
            Unit = unit,
            Accuracy = accuracy ?? AssumedAccuracy.For(unit, range),
            Range = range,
            Interpolation = Texts.Choice(mapping.Take("interpolation"), Interpolations, findings) ?? Interpolation.Step,
            Resolution = Texts.Number(mapping.Take("resolution"), $"a number from 0 in {unit.Written}", n => n >= 0, findings) is { } step
                ? unit.DifferenceToSi(step) : 0,
        };
        instrument = WithTimes(instrument, mapping);
        if (signal is null) return null;
        if (instrument.Accuracy.Assumed)
            findings.Note(mapping.Node, $"{signal} has no accuracy: ±{AssumedAccuracy.InWords(instrument.Accuracy, unit)} is assumed");
        signals.Add(signalNode!, instrument);
        return instrument;
    }

    /// <summary>A signal that is a bare number, such as the number of a product, in a mapping of its own kind.</summary>
    public Instrument? Number(MappingReader mapping)
    {
        PlantNode? signalNode = mapping.Require("signal", "the name of a signal");
        string? signal = Texts.Text(signalNode, "the name of a signal", findings);
        var unit = new UnitOfMeasure("", Dimension.Number, 1);
        var instrument = new Instrument { Signal = signal ?? "", Unit = unit, Accuracy = AssumedAccuracy.For(unit, null) };
        instrument = WithTimes(instrument, mapping);
        if (signal is null) return null;
        signals.Add(signalNode!, instrument);
        return instrument;
    }

    private Instrument WithTimes(Instrument instrument, MappingReader mapping) => instrument with
    {
        StaleAfter = Quantities.Time(mapping.Take("stale-after"), TimeSpan.FromSeconds(1), Longest, findings) ?? instrument.StaleAfter,
        FrozenAfter = Quantities.Time(mapping.Take("frozen-after"), TimeSpan.FromSeconds(1), Longest, findings) ?? instrument.FrozenAfter,
    };

    private UnitOfMeasure? Unit(MappingReader mapping, Dimension[] dimensions)
    {
        string allowed = "a unit of " + string.Join(" or of ", dimensions.Select(Units.Allowed));
        PlantNode? node = mapping.Require("unit", allowed);
        if (node is null) return null;
        string? written = Texts.Text(node, allowed, findings);
        if (written is null) return null;
        UnitOfMeasure? unit = Units.Find(written);
        if (unit is not null && dimensions.Contains(unit.Dimension)) return unit;
        findings.Wrong(node, $"{Shown.Quoted(written)} ({Quantities.Flaw(written, dimensions[0], out _)})", allowed);
        return null;
    }

    private (double Low, double High)? Range(PlantNode? node, UnitOfMeasure unit)
    {
        if (node is null) return null;
        if (node is ListNode { Items: [ScalarNode first, ScalarNode last] } && Texts.TryNumber(first.Text, out double low)
            && Texts.TryNumber(last.Text, out double high) && low < high)
            return (unit.ToSi(low), unit.ToSi(high));
        findings.Wrong(node, $"[lowest, highest], two numbers in {unit.Written}, the lower one first");
        return null;
    }
}
