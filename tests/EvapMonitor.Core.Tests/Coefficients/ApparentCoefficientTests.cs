using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Coefficients;

public class ApparentCoefficientTests
{
    /// <summary>Steam, its pressure and those of the vapours, solids and one flow of condensate: nothing that checks another.</summary>
    private static Line Bare() => TestLine.Line(effect => effect with { Chest = new Chest() }, feed: new LiquorStream());

    [Fact]
    public void FirstEffect_IsDutyByAreaAndDrivingForce()
    {
        EffectWindow first = TestLine.Evaluate(Bare(), TestLine.Values).Effects[0];
        double heating = Steam.SaturationTemperature(150_000), saturation = Steam.SaturationTemperature(110_000);
        double elevation = TestLine.Liquor.BoilingPointElevation(0.124, saturation).Value;
        double duty = 4 * (Steam.SaturatedVapourEnthalpy(150_000) - Steam.SaturatedLiquidEnthalpy(150_000));
        Assert.Equal(duty, first.Duty.Value, 1e-6 * duty);
        Assert.Equal(heating - saturation - elevation, first.DrivingForce.Value, 1e-9);
        Assert.Equal(duty / (300 * (heating - saturation - elevation)), first.Coefficient.Value, 1e-6 * first.Coefficient.Value);
        Assert.Equal((HeatingTemperatureSource.SteamPressure, BoilingTemperatureSource.VapourPressure, DutySource.Balance), (first.HeatingFrom, first.BoilingFrom, first.DutyFrom));
    }

    [Fact]
    public void Level_GivesTheDrivingForceAtHalfTheHeightOfTheLiquor()
    {
        var metre = new UnitOfMeasure("m", Dimension.Length, 1);
        Line line = TestLine.Line(effect => effect with { Chest = new Chest(), Level = TestLine.Instrument("L1", metre) }, feed: new LiquorStream());
        EffectWindow without = TestLine.Evaluate(line, TestLine.Values).Effects[0];
        EffectWindow first = TestLine.Evaluate(line, new Dictionary<string, double>(TestLine.Values) { ["L1"] = 1.6 }).Effects[0];
        Assert.Equal(Measured.Absent, without.HeadCorrectedDrivingForce);
        // By hand: 110 kPa and half of 1.6 m of liquor; near 960 kg/m³ that is 7.5 kPa, 1.9 K at 27 K/bar or so.
        double density = TestLine.Liquor.Density(0.124, first.BoilingTemperature.Value).Value;
        double lost = Steam.SaturationTemperature(110_000 + (density * 9.80665 * 0.8)) - Steam.SaturationTemperature(110_000);
        Assert.InRange(lost, 1.7, 2.1);
        Assert.Equal(first.DrivingForce.Value - lost, first.HeadCorrectedDrivingForce.Value, 1e-9);
        // The level's 1 % beside what the driving force has; its pressures and elevation are the same ones, so that nothing else grows.
        Assert.InRange(first.HeadCorrectedDrivingForce.Standard, 0.9 * first.DrivingForce.Standard, 1.01 * first.DrivingForce.Standard);
        double byLevel = 0.01 * 0.8 * density * 9.80665 * Steam.SaturationTemperatureSlope(110_000 + (density * 9.80665 * 0.8));
        EffectWindow sharp = TestLine.Evaluate(
            TestLine.Line(effect => effect with { Chest = new Chest(), Level = TestLine.Instrument("L1", metre) with { Accuracy = new Accuracy(0, 0, AccuracyMeaning.Standard) } }, feed: new LiquorStream()),
            new Dictionary<string, double>(TestLine.Values) { ["L1"] = 1.6 }).Effects[0];
        double of(Measured one) => one.Systematic * one.Systematic;
        Assert.Equal(byLevel, double.Sqrt(of(first.HeadCorrectedDrivingForce) - of(sharp.HeadCorrectedDrivingForce)), 1e-3 * byLevel);
        Assert.Equal(first.Coefficient, without.Coefficient);
    }

    [Fact]
    public void SecondEffect_IsHeatedAtSaturationWithSuperheatedVapour()
    {
        EffectWindow second = TestLine.Evaluate(Bare(), TestLine.Values).Effects[1];
        double saturation = Steam.SaturationTemperature(110_000), boiling = saturation + TestLine.Liquor.BoilingPointElevation(0.124, saturation).Value;
        double duty = 3.9 * (Steam.VapourEnthalpy(110_000, boiling) - Steam.SaturatedLiquidEnthalpy(110_000));
        Assert.Equal(saturation, second.HeatingTemperature.Value, 1e-9);
        Assert.Equal(duty, second.Duty.Value, 1e-6 * duty);
    }

    [Fact]
    public void LiquorSide_BalancesVapourAndLiquors()
    {
        Line line = TestLine.Line(effect => effect with { Chest = new Chest() }, steam: new SteamMain { Pressure = TestLine.Instrument("SP", TestLine.Pascal), PressureAt = SteamGaugePlace.Chest });
        Dictionary<string, double> values = TestLine.Values;
        // Nothing of the second effect that would check the first.
        values.Remove("C2");
        values.Remove("X2");
        EffectWindow first = TestLine.Evaluate(line, values).Effects[0];
        double saturation = Steam.SaturationTemperature(110_000), boiling = saturation + TestLine.Liquor.BoilingPointElevation(0.124, saturation).Value;
        double leaving = 20 * 0.1 / 0.124, vapour = 20 - leaving;
        double duty = (vapour * Steam.VapourEnthalpy(110_000, boiling)) + (leaving * TestLine.Liquor.Enthalpy(0.124, boiling)) - (20 * TestLine.Liquor.Enthalpy(0.1, 365));
        Assert.Equal(duty, first.Duty.Value, 1e-6 * duty);
    }

    [Fact]
    public void Uncertainty_IsThatOfJcgm100ForAProductOfInputs()
    {
        // Steam flow 1 %, pressures 1 % each, elevation by its correlation: Q carries the flow's 1 % and almost nothing else, the driving force what the pressures do.
        EffectWindow first = TestLine.Evaluate(Bare(), TestLine.Values).Effects[0];
        double byChest = 0.01 * 150_000 * Steam.SaturationTemperatureSlope(150_000), byVapour = 0.01 * 110_000 * Steam.SaturationTemperatureSlope(110_000);
        double saturation = Steam.SaturationTemperature(110_000);
        double byElevation = TestLine.Liquor.BoilingPointElevation(0.124, saturation).Standard;
        double bySolids = 0.01 * 0.124 * (TestLine.Liquor.BoilingPointElevation(0.1241, saturation).Value - TestLine.Liquor.BoilingPointElevation(0.1239, saturation).Value) / 0.0002;
        double expected = double.Sqrt((byChest * byChest) + (byVapour * byVapour) + (byElevation * byElevation) + (bySolids * bySolids));
        Assert.Equal(expected, first.DrivingForce.Systematic, 0.01 * expected);
        Assert.Equal(0.01, first.Duty.Systematic / first.Duty.Value, 0.0005);
        double relative = double.Sqrt((0.01 * 0.01) + double.Pow(expected / first.DrivingForce.Value, 2));
        Assert.Equal(relative, first.Coefficient.Systematic / first.Coefficient.Value, 0.02 * relative);
    }

    [Fact]
    public void GaugesOnOneAtmosphere_ErrOfTheAtmosphereMostlyCancelsInTheDrivingForce()
    {
        var gauge = new UnitOfMeasure("Pa(g)", Dimension.Pressure, 1, 0, PressureReference.Gauge);
        Instrument Exact(string signal) => TestLine.Instrument(signal, gauge) with { Accuracy = new Accuracy(0, 0, AccuracyMeaning.Standard) };
        Line line = TestLine.Line(
            effect => effect with { Chest = new Chest(), Vapour = new VapourSpace { Pressure = Exact("P1") } }, feed: new LiquorStream(), steam: new SteamMain { Flow = TestLine.Instrument("SF", TestLine.Flow), Pressure = Exact("SP"), PressureAt = SteamGaugePlace.Chest });
        Dictionary<string, double> values = TestLine.Values;
        values["SP"] -= 101_325;
        values["P1"] -= 101_325;
        EffectWindow first = TestLine.Evaluate(line, values).Effects[0];
        double chest = 800 * Steam.SaturationTemperatureSlope(150_000), vapour = 800 * Steam.SaturationTemperatureSlope(110_000);
        Assert.Equal(chest, first.HeatingTemperature.Systematic, 0.02 * chest);
        double withoutAtmosphere = TestLine.Evaluate(line, values, Measured(values)).Effects[0].DrivingForce.Systematic;
        double share = double.Sqrt((first.DrivingForce.Systematic * first.DrivingForce.Systematic) - (withoutAtmosphere * withoutAtmosphere));
        Assert.Equal(double.Abs(vapour - chest), share, 0.1 * double.Abs(vapour - chest));

        static FixedOrMeasured Measured(Dictionary<string, double> values)
        {
            values["AIR"] = 101_325;
            return new(null, TestLine.Instrument("AIR", TestLine.Pascal) with { Accuracy = new Accuracy(0, 0, AccuracyMeaning.Standard) });
        }
    }

    [Theory]
    [InlineData("P1", "no boiling temperature: P1 has no reading")]
    [InlineData("SP", "no heating temperature: SP has no reading")]
    [InlineData("X1", "no boiling temperature: X1 has no reading")]
    public void LostInstrument_IsNamedInTheReason(string lost, string reason)
    {
        Dictionary<string, double> values = TestLine.Values;
        values.Remove(lost);
        EffectWindow first = TestLine.Evaluate(Bare(), values).Effects[0];
        Assert.False(first.Coefficient.IsPresent);
        Assert.Equal(reason, first.Reason);
    }

    [Fact]
    public void LostFlows_AreMadeGoodByTheBalance_WhileItCan()
    {
        Dictionary<string, double> values = TestLine.Values;
        double Uncertainty()
        {
            EffectWindow first = TestLine.Evaluate(TestLine.Line(), values).Effects[0];
            Assert.Null(first.Reason);
            return first.Duty.Standard / first.Duty.Value;
        }

        double all = Uncertainty();
        values.Remove("SF");
        double without = Uncertainty();
        values.Remove("C1");
        double poorer = Uncertainty();
        // The vapour of the first effect is what condenses in the second.
        values.Remove("FF");
        double poorest = Uncertainty();
        Assert.True(all < without && without < poorer && poorer < poorest, $"{all} {without} {poorer} {poorest}");
        values.Remove("C2");
        Assert.Equal("no duty: C1 has no reading", TestLine.Evaluate(TestLine.Line(), values).Effects[0].Reason);
    }

    [Fact]
    public void LostSolids_FollowFromTheBalance()
    {
        Dictionary<string, double> values = TestLine.Values;
        values.Remove("X1");
        EffectWindow first = TestLine.Evaluate(TestLine.Line(), values).Effects[0];
        Assert.Equal(20 * 0.1 / (20 - 3.9), first.Solids, 0.005);
        Assert.Null(first.Reason);
    }

    [Theory]
    [InlineData("P1", 149_000.0, "no driving force")]
    [InlineData("P1", 170_000.0, "no driving force: under 0.5 K")]
    [InlineData("SF", 0.0, "no duty: no heat flows from the chest to the liquor")]
    [InlineData("SF", -3.0, "no duty: no heat flows from the chest to the liquor")]
    [InlineData("P1", -5.0, "no boiling temperature")]
    [InlineData("SP", 5e7, "no heating temperature")]
    [InlineData("X1", 1.7, "no boiling temperature")]
    public void OddReadings_GiveAReasonAndNoNumber(string signal, double value, string reason)
    {
        Dictionary<string, double> values = TestLine.Values;
        values[signal] = value;
        EffectWindow first = TestLine.Evaluate(Bare(), values).Effects[0];
        Assert.StartsWith(reason, first.Reason, StringComparison.Ordinal);
        Assert.False(first.Coefficient.IsPresent);
    }

    [Fact]
    public void PressureDifference_GivesTheChestWithoutAGauge_AndMakesTheDrivingForceSurerWithOne()
    {
        Dictionary<string, double> values = TestLine.Values;
        values["D1"] = 40_000;
        Line With(bool gauge) => TestLine.Line(
            effect => effect with { Chest = new Chest(), PressureDifference = TestLine.Instrument("D1", TestLine.Pascal) }, feed: new LiquorStream(),
            steam: new SteamMain { Flow = TestLine.Instrument("SF", TestLine.Flow), Pressure = gauge ? TestLine.Instrument("SP", TestLine.Pascal) : null, PressureAt = SteamGaugePlace.Chest });
        EffectWindow without = TestLine.Evaluate(With(gauge: false), values).Effects[0], with = TestLine.Evaluate(With(gauge: true), values).Effects[0];
        EffectWindow bare = TestLine.Evaluate(Bare(), values).Effects[0];
        Assert.Equal(Steam.SaturationTemperature(150_000), without.HeatingTemperature.Value, 1e-6);
        Assert.Equal(HeatingTemperatureSource.Balance, without.HeatingFrom);
        Assert.True(without.DrivingForce.Standard < bare.DrivingForce.Standard, "two gauges a tenth apart know their difference worse than an instrument across");
        Assert.True(with.DrivingForce.Standard < without.DrivingForce.Standard);
    }

    [Fact]
    public void RandomReadings_NeverThrowAndNeverGiveANumberWithAReason()
    {
        var random = new Random(20260301);
        Line line = TestLine.Line();
        for (int i = 0; i < 300; i++)
        {
            Dictionary<string, double> values = TestLine.Values.ToDictionary(pair => pair.Key, pair => random.Next(6) switch
            {
                0 => 0,
                1 => -pair.Value,
                2 => pair.Value * double.Exp(12 * (random.NextDouble() - 0.5)),
                3 => double.NaN,
                _ => pair.Value,
            });
            foreach (EffectWindow effect in TestLine.Evaluate(line, values).Effects)
            {
                Assert.Equal(effect.Reason is null, effect.Coefficient.IsPresent);
                Assert.True(effect.Reason is not null || (effect.Coefficient.Value > 0 && effect.Coefficient.Standard >= 0));
            }
        }
    }

    [Fact]
    public void SameInput_SameBits()
    {
        LineWindow once = TestLine.Evaluate(TestLine.Line(), TestLine.Values), again = TestLine.Evaluate(TestLine.Line(), TestLine.Values);
        Assert.Equal(once.Effects, again.Effects);
    }
}
