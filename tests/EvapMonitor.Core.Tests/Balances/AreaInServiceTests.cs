using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;
using static EvapMonitor.Core.Tests.Balances.TestLines;

namespace EvapMonitor.Core.Tests.Balances;

public class AreaInServiceTests
{
    [Theory]
    [InlineData(1, 0, 300)]
    [InlineData(1, 1, 500)]
    [InlineData(0, 1, 200)]
    [InlineData(0, 0, 0)]
    [InlineData(double.NaN, 1, double.NaN)]
    public void BodiesByTheirSignals_MakeTheSurface(double first, double second, double surface)
    {
        ActiveSignal Valve(string signal) => new(Meter(signal) with { Unit = new UnitOfMeasure("", Dimension.Number, 1) }, Comparison.Above, 0.5);
        Line line = Of(Effect("A", HeatSource.Steam, LiquorSource.Feed, 500) with { Bodies = ["L", "R"] }) with
        {
            Bodies = [new("L", 300, new Dictionary<string, ActiveSignal> { ["A"] = Valve("V1") }), new("R", 200, new Dictionary<string, ActiveSignal> { ["A"] = Valve("V2") })],
        };
        Assert.Equal(surface, Surface(line, first, second));
    }

    [Theory]
    [InlineData(0, 450)]
    [InlineData(1, 300)]
    public void Spare_TakesThePlaceOfTheEffectsOwnSurface(double valve, double surface)
    {
        Line line = Of(Effect("A", HeatSource.Steam, LiquorSource.Feed, 450)) with
        {
            Bodies = [new("SPARE", 300, new Dictionary<string, ActiveSignal> { ["A"] = new(Meter("V"), Comparison.Above, 0.5) })],
        };
        Assert.Equal(surface, Surface(line, valve));
    }

    private static double Surface(Line line, params double[] values)
    {
        var instruments = new LineInstruments(line);
        var inputs = new LineInputs(instruments);
        values.CopyTo(inputs.Value, 0);
        return instruments.Surfaces[0].At(inputs);
    }
}
