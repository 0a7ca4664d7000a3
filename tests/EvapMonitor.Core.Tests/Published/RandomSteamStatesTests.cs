using System.Globalization;
using System.Runtime.CompilerServices;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>Two thousand random states against an independent implementation of IAPWS-IF97: see iapws/README.md.</summary>
/// <remarks>
/// Both sides evaluate the same polynomials in double precision and differ by rounding alone. The sums lose up to four digits by cancellation near 0 °C, where
/// enthalpy and entropy of the liquid pass through zero: hence a tolerance of 1e-12 of the value plus an absolute 1e-12 of the quantity's size at 100 °C.
/// Along the saturation line the temperature itself carries rounding of about 1e-13 (equation 31 subtracts nearly equal numbers at low pressure), which
/// heat capacity and volume pass on times the steepness of the equation near 623 K: 1e-11 there.
/// </remarks>
public class RandomSteamStatesTests
{
    public sealed record State(string Region, double Pressure, double Temperature, double Volume, double Enthalpy, double Entropy, double HeatCapacity);

    private static IReadOnlyList<State> States([CallerFilePath] string here = "")
    {
        var lines = File.ReadAllLines(Path.Combine(Path.GetDirectoryName(here)!, "iapws", "steam_states.csv"));
        return [.. lines.Skip(2).Select(line => line.Split(',')).Select(cells =>
        {
            var numbers = cells.Skip(1).Select(cell => double.Parse(cell, CultureInfo.InvariantCulture)).ToArray();
            return new State(cells[0], numbers[0], numbers[1], numbers[2], numbers[3], numbers[4], numbers[5]);
        })];
    }

    private static void Near(double expected, double actual, double relative, double size, State state) =>
        Assert.True(Math.Abs(expected - actual) <= relative * (Math.Abs(expected) + size), $"{state}: expected {expected:R}, got {actual:R}");

    [Fact]
    public void Fixture_HoldsFiveHundredStatesOfEachKind() =>
        Assert.Equal([500, 500, 500, 500], States().GroupBy(state => state.Region).Select(group => group.Count()));

    [Fact]
    public void StatesOfLiquid_AgreeWithIndependentImplementation()
    {
        foreach (var state in States().Where(state => state.Region == "liquid"))
        {
            Near(state.Volume, Steam.LiquidVolume(state.Pressure, state.Temperature), 1e-12, 0, state);
            Near(state.Enthalpy, Steam.LiquidEnthalpy(state.Pressure, state.Temperature), 1e-12, 4e5, state);
            Near(state.Entropy, Steam.LiquidEntropy(state.Pressure, state.Temperature), 1e-12, 1e3, state);
            Near(state.HeatCapacity, Steam.LiquidHeatCapacity(state.Pressure, state.Temperature), 1e-12, 0, state);
        }
    }

    [Fact]
    public void StatesOfVapour_AgreeWithIndependentImplementation()
    {
        foreach (var state in States().Where(state => state.Region == "vapour"))
        {
            Near(state.Volume, Steam.VapourVolume(state.Pressure, state.Temperature), 1e-12, 0, state);
            Near(state.Enthalpy, Steam.VapourEnthalpy(state.Pressure, state.Temperature), 1e-12, 0, state);
            Near(state.Entropy, Steam.VapourEntropy(state.Pressure, state.Temperature), 1e-12, 0, state);
            Near(state.HeatCapacity, Steam.VapourHeatCapacity(state.Pressure, state.Temperature), 1e-12, 0, state);
        }
    }

    [Fact]
    public void SaturatedStates_AgreeWithIndependentImplementation()
    {
        foreach (var state in States().Where(state => state.Region.StartsWith("saturated", StringComparison.Ordinal)))
        {
            var liquid = state.Region == "saturated-liquid";
            Near(state.Temperature, Steam.SaturationTemperature(state.Pressure), 1e-12, 0, state);
            Near(state.Pressure, Steam.SaturationPressure(state.Temperature), 1e-11, 0, state);
            Near(state.Enthalpy, liquid ? Steam.SaturatedLiquidEnthalpy(state.Pressure) : Steam.SaturatedVapourEnthalpy(state.Pressure), 1e-11, 4e5, state);
            Near(state.Volume, liquid ? Steam.SaturatedLiquidVolume(state.Pressure) : Steam.SaturatedVapourVolume(state.Pressure), 1e-11, 0, state);
        }
    }
}
