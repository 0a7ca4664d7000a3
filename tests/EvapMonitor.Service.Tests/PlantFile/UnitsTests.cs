using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class UnitsTests
{
    /// <summary>
    /// Expected factors: NIST Special Publication 811 (2008), appendix B.8, from memory; SI multiples are exact by definition.
    /// Horsepower is the mechanical one (550 ft·lbf/s); Btu is that of the International Table.
    /// </summary>
    [Theory]
    [InlineData("Pa", Dimension.Pressure, 1)]
    [InlineData("kPa", Dimension.Pressure, 1e3)]
    [InlineData("MPa", Dimension.Pressure, 1e6)]
    [InlineData("hPa", Dimension.Pressure, 100)]
    [InlineData("bar", Dimension.Pressure, 1e5)]
    [InlineData("mbar", Dimension.Pressure, 100)]
    [InlineData("psi", Dimension.Pressure, 6894.757293)]
    [InlineData("atm", Dimension.Pressure, 101325)]
    [InlineData("torr", Dimension.Pressure, 133.3223684)]
    [InlineData("mmHg", Dimension.Pressure, 133.3223874)]
    [InlineData("inHg", Dimension.Pressure, 3386.38864)]
    [InlineData("kgf/cm2", Dimension.Pressure, 98066.5)]
    [InlineData("kg/cm2", Dimension.Pressure, 98066.5)]
    [InlineData("mmH2O", Dimension.Pressure, 9.80665)]
    [InlineData("mH2O", Dimension.Pressure, 9806.65)]
    [InlineData("t/h", Dimension.MassFlow, 1000.0 / 3600)]
    [InlineData("kg/h", Dimension.MassFlow, 1.0 / 3600)]
    [InlineData("kg/s", Dimension.MassFlow, 1)]
    [InlineData("kg/min", Dimension.MassFlow, 1.0 / 60)]
    [InlineData("g/s", Dimension.MassFlow, 1e-3)]
    [InlineData("t/d", Dimension.MassFlow, 1000.0 / 86400)]
    [InlineData("lb/h", Dimension.MassFlow, 1.259978806e-4)]
    [InlineData("lb/hr", Dimension.MassFlow, 1.259978806e-4)]
    [InlineData("lb/min", Dimension.MassFlow, 7.559872833e-3)]
    [InlineData("lb/s", Dimension.MassFlow, 0.45359237)]
    [InlineData("klb/h", Dimension.MassFlow, 0.1259978806)]
    [InlineData("m3/h", Dimension.VolumeFlow, 1.0 / 3600)]
    [InlineData("m³/h", Dimension.VolumeFlow, 1.0 / 3600)]
    [InlineData("m3/min", Dimension.VolumeFlow, 1.0 / 60)]
    [InlineData("m3/s", Dimension.VolumeFlow, 1)]
    [InlineData("m3/d", Dimension.VolumeFlow, 1.0 / 86400)]
    [InlineData("l/h", Dimension.VolumeFlow, 1e-3 / 3600)]
    [InlineData("l/min", Dimension.VolumeFlow, 1e-3 / 60)]
    [InlineData("L/min", Dimension.VolumeFlow, 1e-3 / 60)]
    [InlineData("l/s", Dimension.VolumeFlow, 1e-3)]
    [InlineData("L/s", Dimension.VolumeFlow, 1e-3)]
    [InlineData("L/h", Dimension.VolumeFlow, 1e-3 / 3600)]
    [InlineData("ft3/h", Dimension.VolumeFlow, 7.865790720e-6)]
    [InlineData("ft3/min", Dimension.VolumeFlow, 4.719474432e-4)]
    [InlineData("gpm(US)", Dimension.VolumeFlow, 6.309019640e-5)]
    [InlineData("%", Dimension.Fraction, 0.01)]
    [InlineData("°Bx", Dimension.Fraction, 0.01)]
    [InlineData("degBx", Dimension.Fraction, 0.01)]
    [InlineData("°Brix", Dimension.Fraction, 0.01)]
    [InlineData("kg/kg", Dimension.Fraction, 1)]
    [InlineData("g/g", Dimension.Fraction, 1)]
    [InlineData("g/kg", Dimension.Fraction, 1e-3)]
    [InlineData("m", Dimension.Length, 1)]
    [InlineData("cm", Dimension.Length, 0.01)]
    [InlineData("mm", Dimension.Length, 1e-3)]
    [InlineData("ft", Dimension.Length, 0.3048)]
    [InlineData("in", Dimension.Length, 0.0254)]
    [InlineData("m2", Dimension.Area, 1)]
    [InlineData("m²", Dimension.Area, 1)]
    [InlineData("m^2", Dimension.Area, 1)]
    [InlineData("ft2", Dimension.Area, 0.09290304)]
    [InlineData("ft²", Dimension.Area, 0.09290304)]
    [InlineData("sqft", Dimension.Area, 0.09290304)]
    [InlineData("kg", Dimension.Mass, 1)]
    [InlineData("t", Dimension.Mass, 1000)]
    [InlineData("lb", Dimension.Mass, 0.45359237)]
    [InlineData("W", Dimension.Power, 1)]
    [InlineData("kW", Dimension.Power, 1e3)]
    [InlineData("MW", Dimension.Power, 1e6)]
    [InlineData("hp", Dimension.Power, 745.6998716)]
    [InlineData("W/(m2.K)", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("W/(m²·K)", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("W/(m2 K)", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("W/m2K", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("W/m²/K", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("W/(m2.degC)", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("W/(m²·°C)", Dimension.HeatTransferCoefficient, 1)]
    [InlineData("kW/(m2.K)", Dimension.HeatTransferCoefficient, 1e3)]
    [InlineData("Btu/(h.ft2.F)", Dimension.HeatTransferCoefficient, 5.678263341)]
    [InlineData("Btu/(h·ft²·°F)", Dimension.HeatTransferCoefficient, 5.678263341)]
    [InlineData("kcal/(h.m2.K)", Dimension.HeatTransferCoefficient, 1.163)]
    [InlineData("s", Dimension.Duration, 1)]
    [InlineData("min", Dimension.Duration, 60)]
    [InlineData("h", Dimension.Duration, 3600)]
    [InlineData("d", Dimension.Duration, 86400)]
    public void Spelling_HasPublishedFactor(string written, Dimension dimension, double factor)
    {
        UnitOfMeasure unit = Assert.IsType<UnitOfMeasure>(Units.Find(written));
        Assert.Equal((written, dimension, PressureReference.Absolute, 0), (unit.Written, unit.Dimension, unit.Reference, unit.Offset));
        Assert.InRange(unit.Factor / factor, 1 - 3e-8, 1 + 3e-8);
    }

    [Theory]
    [InlineData("degC", 60, 333.15)]
    [InlineData("°C", 0, 273.15)]
    [InlineData("ºC", 0, 273.15)]
    [InlineData("℃", 100, 373.15)]
    [InlineData("° C", 100, 373.15)]
    [InlineData("degF", 212, 373.15)]
    [InlineData("°F", 32, 273.15)]
    [InlineData("K", 300, 300)]
    public void Temperature_BecomesKelvin(string written, double value, double kelvin) => Assert.Equal(kelvin, Units.Find(written)!.ToSi(value), 1e-9);

    [Theory]
    [InlineData("bar(a)", PressureReference.Absolute)]
    [InlineData("bara", PressureReference.Absolute)]
    [InlineData("bar a", PressureReference.Absolute)]
    [InlineData("psi(a)", PressureReference.Absolute)]
    [InlineData("psia", PressureReference.Absolute)]
    [InlineData("kPa abs", PressureReference.Absolute)]
    [InlineData("bar(g)", PressureReference.Gauge)]
    [InlineData("bar (g)", PressureReference.Gauge)]
    [InlineData("barg", PressureReference.Gauge)]
    [InlineData("mbar(g)", PressureReference.Gauge)]
    [InlineData("kPa(g)", PressureReference.Gauge)]
    [InlineData("psi(g)", PressureReference.Gauge)]
    [InlineData("psig", PressureReference.Gauge)]
    [InlineData("MPa gauge", PressureReference.Gauge)]
    [InlineData("mmHg vacuum", PressureReference.Vacuum)]
    [InlineData("mmHg  vacuum", PressureReference.Vacuum)]
    [InlineData("inHg vacuum", PressureReference.Vacuum)]
    [InlineData("inHg vac", PressureReference.Vacuum)]
    [InlineData("kPa(vac)", PressureReference.Vacuum)]
    public void Pressure_SaysAgainstWhat(string written, PressureReference reference) => Assert.Equal(reference, Units.Find(written)!.Reference);

    [Theory]
    [InlineData("")]
    [InlineData("bars")]
    [InlineData("BAR")]
    [InlineData("mw")]
    [InlineData("C")]
    [InlineData("ton/h")]
    [InlineData("gpm")]
    [InlineData("m3")]
    public void UnknownOrAmbiguous_IsNoUnit(string written) => Assert.Null(Units.Find(written));

    [Fact]
    public void EveryKnownUnit_IsFoundByItsOwnSpelling()
    {
        Assert.True(Units.Known.Count() > 250);
        Assert.All(Units.Known, unit => Assert.Equal(unit, Units.Find(unit.Written)));
    }
}
