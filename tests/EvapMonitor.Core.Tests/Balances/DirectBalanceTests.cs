using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using static EvapMonitor.Core.Tests.Balances.TestLines;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>
/// The way back: readings made from a rated line must give the coefficients that were put in, or none. The two share no balance code.
/// </summary>
public class DirectBalanceTests
{
    private static Instrument Meter(string signal, Dimension dimension) =>
        TestLines.Meter(signal) with { Unit = new UnitOfMeasure("si", dimension, 1) };

    /// <summary>The line with every instrument that the direct way can use, and what they read at the operating point.</summary>
    private static (Line Line, Dictionary<string, double> Readings) Instrumented(Line line, OperatingPoint point)
    {
        var readings = new Dictionary<string, double>();
        Instrument At(VariableKind kind, string place, Dimension dimension)
        {
            string signal = $"{kind}.{place}";
            readings[signal] = point[kind, place];
            return Meter(signal, dimension);
        }

        Line all = line with
        {
            Feed = new LiquorStream
            {
                Flow = At(VariableKind.FeedFlow, "", Dimension.MassFlow), Solids = At(VariableKind.FeedSolids, "", Dimension.Fraction),
                Temperature = At(VariableKind.FeedTemperature, "", Dimension.Temperature),
            },
            Effects = [.. line.Effects.Select(effect => effect with
            {
                Chest = effect.Chest with
                {
                    Pressure = effect.Heating.Any(source => source.VapourOf is not null) ? null : At(VariableKind.ChestPressure, effect.Name, Dimension.Pressure),
                    CondensateFlow = At(VariableKind.CondensateFlow, effect.Name, Dimension.MassFlow),
                },
                Vapour = new VapourSpace { Pressure = At(VariableKind.VapourPressure, effect.Name, Dimension.Pressure) },
                Leaving = new LeavingLiquor { Solids = At(VariableKind.LeavingSolids, effect.Name, Dimension.Fraction) },
            })],
            Recompressors = [.. line.Recompressors.Select(machine => machine.Kind == RecompressorKind.Thermal
                ? machine with { Motive = new(At(VariableKind.MotiveFlow, machine.Name, Dimension.MassFlow), Meter("motive pressure", Dimension.Pressure), Meter("motive temperature", Dimension.Temperature)) }
                : machine with
                {
                    Power = At(VariableKind.Power, machine.Name, Dimension.Power),
                    Spray = machine.Spray is null ? null : At(VariableKind.SprayFlow, machine.Name, Dimension.MassFlow),
                })],
        };
        readings["motive pressure"] = 9e5;
        readings["motive temperature"] = Steam.SaturationTemperature(9e5) + 5;
        return (all, readings);
    }

    private static EffectState[] Solve(Line line, Dictionary<string, double> readings)
    {
        var instruments = new LineInstruments(line);
        var inputs = new LineInputs(instruments);
        for (int place = 0; place < instruments.All.Count; place++) inputs.Value[place] = readings.GetValueOrDefault(instruments.All[place].Signal, double.NaN);
        var states = new EffectState[line.Effects.Count];
        new DirectBalance(instruments).Solve(line.Liquor.Always!, inputs, states);
        return states;
    }

    private static double Coefficient(in EffectState state, DutySource source) =>
        HeatBalance.Coefficient(state.Duty[(int)source], state.Area, state.HeatingTemperature - state.BoilingTemperature);

    [Theory]
    [InlineData("forward")]
    [InlineData("backward")]
    [InlineData("parallel")]
    [InlineData("mixed")]
    [InlineData("thermal")]
    [InlineData("mechanical")]
    [InlineData("sprayed")]
    [InlineData("cascade")]
    public void ReadingsOfARatedLine_GiveItsCoefficientsBack(string name)
    {
        OperatingPoint point = Named(name).Solved();
        (Line line, Dictionary<string, double> readings) = Instrumented(Named(name).Graph.Line, point);
        EffectState[] states = Solve(line, readings);
        for (int i = 0; i < states.Length; i++)
        {
            // Flash vapour is a little less superheated than the vapour it joins, for which the direct way takes it: hence 0.1 % on the condensate.
            Assert.Equal(1, Coefficient(states[i], DutySource.Condensate) / point.Effects[i].Coefficient, 1e-3);
            Assert.Equal(1, Coefficient(states[i], DutySource.Liquor) / point.Effects[i].Coefficient, 1e-6);
        }
    }

    [Fact]
    public void LiquorThroughATank_HasNoDutyByTheLiquor()
    {
        OperatingPoint point = Named("shares").Solved();
        (Line line, Dictionary<string, double> readings) = Instrumented(Named("shares").Graph.Line, point);
        EffectState[] states = Solve(line, readings);
        Assert.Equal(1, Coefficient(states[0], DutySource.Liquor) / point.Effects[0].Coefficient, 1e-6);
        // C takes from the tank, D from C: neither flow is known at the time.
        Assert.Equal(double.NaN, states[2].Duty[(int)DutySource.Liquor]);
        Assert.Equal(1, Coefficient(states[2], DutySource.Condensate) / point.Effects[2].Coefficient, 1e-3);
    }

    [Fact]
    public void RecompressorWithoutPower_HasNoDutyByCondensate()
    {
        OperatingPoint point = Named("mechanical").Solved();
        (Line line, Dictionary<string, double> readings) = Instrumented(Named("mechanical").Graph.Line, point);
        readings.Remove("Power.M1");
        EffectState state = Solve(line, readings)[0];
        Assert.Equal(double.NaN, state.Duty[(int)DutySource.Condensate]);
        Assert.Equal(1, Coefficient(state, DutySource.Liquor) / point.Effects[0].Coefficient, 1e-6);
    }

    [Fact]
    public void FlashIntoTheSteamChest_TakesTheSteamFlowAwayAsADuty()
    {
        Line line = Of(Effect("A", HeatSource.Steam, LiquorSource.Feed, 100), Effect("B", Vapour("A"), From("A"), 100)) with
        {
            Steam = new SteamMain { Flow = Meter("S", Dimension.MassFlow), Pressure = Meter("P", Dimension.Pressure), PressureAt = SteamGaugePlace.Chest },
        };
        var readings = new Dictionary<string, double> { ["S"] = 2, ["P"] = 2e5 };
        Assert.True(Solve(line, readings)[0].Duty[(int)DutySource.Steam] > 4e6);
        Assert.Equal(double.NaN, Solve(line with { CondensateFlashes = [new("B", "A")] }, readings)[0].Duty[(int)DutySource.Steam]);
    }

    [Theory]
    [InlineData(1, 0, 300)]
    [InlineData(1, 1, 500)]
    [InlineData(0, 1, 200)]
    [InlineData(0, 0, 0)]
    [InlineData(double.NaN, 1, double.NaN)]
    public void BodiesByTheirSignals_MakeTheSurface(double first, double second, double surface)
    {
        ActiveSignal Valve(string signal) => new(Meter(signal, Dimension.Number), Comparison.Above, 0.5);
        Line line = Of(Effect("A", HeatSource.Steam, LiquorSource.Feed, 500) with { Bodies = ["L", "R"] }) with
        {
            Bodies = [new("L", 300, new Dictionary<string, ActiveSignal> { ["A"] = Valve("V1") }), new("R", 200, new Dictionary<string, ActiveSignal> { ["A"] = Valve("V2") })],
        };
        Assert.Equal(surface, Solve(line, new() { ["V1"] = first, ["V2"] = second })[0].Area);
    }

    [Theory]
    [InlineData(0, 450)]
    [InlineData(1, 300)]
    public void Spare_TakesThePlaceOfTheEffectsOwnSurface(double valve, double surface)
    {
        Line line = Of(Effect("A", HeatSource.Steam, LiquorSource.Feed, 450)) with
        {
            Bodies = [new("SPARE", 300, new Dictionary<string, ActiveSignal> { ["A"] = new(Meter("V", Dimension.Number), Comparison.Above, 0.5) })],
        };
        Assert.Equal(surface, Solve(line, new() { ["V"] = valve })[0].Area);
    }
}
