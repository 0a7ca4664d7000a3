using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Properties;

public class SteamTests
{
    private static readonly double[] Pressures = [700, 5e3, 20e3, 101325, 3e5, 1e6, 5e6, 12e6, 16e6];

    [Fact]
    public void SaturationLine_ComesBackOnItself()
    {
        for (var temperature = 273.15; temperature <= 647; temperature += 0.37)
            Assert.Equal(temperature, Steam.SaturationTemperature(Steam.SaturationPressure(temperature)), 1e-8);
    }

    [Fact]
    public void SlopesAlongTheSaturationLine_AgreeWithFiniteDifferences()
    {
        foreach (var pressure in Pressures)
        {
            // central differences of 1e-4 of the pressure: error of second order, about 1e-8, and rounding of about 1e-10
            Agree(Steam.SaturationTemperature, Steam.SaturationTemperatureSlope, pressure, 1e-6);
            Agree(Steam.SaturatedLiquidEnthalpy, Steam.SaturatedLiquidEnthalpySlope, pressure, 1e-6);
            Agree(Steam.SaturatedVapourEnthalpy, Steam.SaturatedVapourEnthalpySlope, pressure, 1e-6);
        }
    }

    [Fact]
    public void DerivativesOfLiquidEnthalpy_AgreeWithFiniteDifferences()
    {
        foreach (var (pressure, temperature) in (ReadOnlySpan<(double, double)>)[(3e6, 300), (5e6, 500), (80e6, 310)])
        {
            Agree(t => Steam.LiquidEnthalpy(pressure, t), t => Steam.LiquidHeatCapacity(pressure, t), temperature, 1e-6);
            Agree(p => Steam.LiquidEnthalpy(p, temperature), p => Steam.LiquidEnthalpyByPressure(p, temperature), pressure, 1e-5);
        }
    }

    [Fact]
    public void DerivativesOfVapourEnthalpy_AgreeWithFiniteDifferences()
    {
        foreach (var (pressure, temperature) in (ReadOnlySpan<(double, double)>)[(20e3, 340), (1e6, 500), (10e6, 800)])
        {
            Agree(t => Steam.VapourEnthalpy(pressure, t), t => Steam.VapourHeatCapacity(pressure, t), temperature, 1e-6);
            Agree(p => Steam.VapourEnthalpy(p, temperature), p => Steam.VapourEnthalpyByPressure(p, temperature), pressure, 1e-5);
        }
    }

    [Fact]
    public void SaturatedLiquidAndVapour_HaveTheSameGibbsEnergy()
    {
        // Phase equilibrium. Regions 1, 2 and 4 are fitted apart and meet only within the tolerance of the formulation: 50 J/kg is under 0.006 % of the latent heat.
        for (var temperature = 273.15; temperature < 623.15; temperature += 0.7)
        {
            var pressure = Steam.SaturationPressure(temperature);
            var liquid = Steam.LiquidEnthalpy(pressure, temperature) - temperature * Steam.LiquidEntropy(pressure, temperature);
            var vapour = Steam.VapourEnthalpy(pressure, temperature) - temperature * Steam.VapourEntropy(pressure, temperature);
            Assert.Equal(liquid, vapour, 50.0);
        }
    }

    [Fact]
    public void SaturatedStatesByPressureAndByTemperature_AreTheSame()
    {
        foreach (var pressure in Pressures)
        {
            var temperature = Steam.SaturationTemperature(pressure);
            Same(Steam.SaturatedLiquidEnthalpy(pressure), Steam.SaturatedLiquidEnthalpyAt(temperature));
            Same(Steam.SaturatedVapourEnthalpy(pressure), Steam.SaturatedVapourEnthalpyAt(temperature));
            Same(Steam.SaturatedLiquidVolume(pressure), Steam.SaturatedLiquidVolumeAt(temperature));
            Same(Steam.LatentHeat(pressure), Steam.LatentHeatAt(temperature));
            Same(Steam.SaturatedVapourEnthalpy(pressure) - Steam.SaturatedLiquidEnthalpy(pressure), Steam.LatentHeat(pressure));
        }
    }

    [Theory]
    [InlineData(600)]
    [InlineData(22.07e6)]
    [InlineData(-1)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void PressureOffTheSaturationLine_IsRefused(double pressure)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturationTemperature(pressure));
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturationTemperatureSlope(pressure));
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturatedVapourEnthalpy(pressure));
    }

    [Theory]
    [InlineData(273.14)]
    [InlineData(647.1)]
    [InlineData(double.NaN)]
    public void TemperatureOffTheSaturationLine_IsRefused(double temperature)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturationPressure(temperature));
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturatedLiquidEnthalpyAt(temperature));
    }

    [Fact]
    public void Refusal_NamesValueUnitAndBounds()
    {
        var message = Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturationTemperature(500)).Message;
        Assert.Contains("500 Pa", message);
        Assert.Contains("611.212677 Pa", message);
        Assert.Contains("22064000 Pa", message);
        var error = Assert.Throws<ArgumentOutOfRangeException>(() => Steam.VapourEnthalpy(1e6, 350));
        Assert.Equal("pressure", error.ParamName);
        Assert.Contains("350 K", error.Message);
    }

    [Fact]
    public void SaturatedStateAboveRegionTwo_IsRefused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturatedLiquidEnthalpy(16.53e6));
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.SaturatedLiquidEnthalpyAt(623.2));
    }

    [Theory]
    [InlineData(1e5, 363.15)] // vapour 9.6 K below saturation: an iteration may pass there
    [InlineData(1e3, 1073.15)]
    [InlineData(16.5e6, 623.15)]
    [InlineData(29e6, 700)]
    [InlineData(99e6, 900)]
    public void VapourWithinItsRange_IsAnswered(double pressure, double temperature) =>
        Assert.InRange(Steam.VapourEnthalpy(pressure, temperature), 2e6, 4.2e6);

    [Theory]
    [InlineData(1e6, 400)]
    [InlineData(17e6, 623.15)]
    [InlineData(32e6, 700)]
    [InlineData(101e6, 900)]
    [InlineData(0, 400)]
    [InlineData(1e5, 1074)]
    [InlineData(1e5, double.NaN)]
    [InlineData(double.NaN, 400)]
    public void VapourOutsideItsRange_IsRefused(double pressure, double temperature) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.VapourEnthalpy(pressure, temperature));

    [Theory]
    [InlineData(1e5, 420)]
    [InlineData(101e6, 300)]
    [InlineData(0, 280)]
    [InlineData(1e6, 624)]
    [InlineData(1e6, double.NaN)]
    [InlineData(double.NaN, 300)]
    public void LiquidOutsideItsRange_IsRefused(double pressure, double temperature) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => Steam.LiquidEnthalpy(pressure, temperature));

    [Fact]
    public void SteamTables_AllocateNothing()
    {
        Assert.True(Use() > 0);
        var before = GC.GetAllocatedBytesForCurrentThread();
        var sum = Use();
        Assert.Equal(0, GC.GetAllocatedBytesForCurrentThread() - before);
        Assert.True(sum > 0);

        static double Use()
        {
            var sum = 0.0;
            for (var p = 1e3; p < 1e6; p += 1e3)
            {
                sum += Steam.SaturatedVapourEnthalpy(p) + Steam.LatentHeat(p) + Steam.SaturatedLiquidVolume(p)
                    + Steam.SaturatedVapourEnthalpySlope(p) + Steam.VapourEntropy(p, 500) + Steam.LiquidHeatCapacity(1e6, 400);
            }
            return sum;
        }
    }

    private static void Same(double expected, double actual) => Assert.Equal(expected, actual, 1e-10 * Math.Abs(expected));

    private static void Agree(Func<double, double> function, Func<double, double> slope, double at, double relative)
    {
        var step = 1e-4 * at;
        var difference = (function(at + step) - function(at - step)) / (2 * step);
        Assert.True(Math.Abs(slope(at) - difference) <= relative * Math.Abs(difference), $"at {at}: slope {slope(at):R}, difference {difference:R}");
    }
}
