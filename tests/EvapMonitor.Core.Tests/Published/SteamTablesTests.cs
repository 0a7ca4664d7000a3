using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>The verification figures of IAPWS R7-97(2012), to all nine digits printed. Internal energy and speed of sound are no properties of a balance; u = h - p·v is checked, w is not computed.</summary>
public class SteamTablesTests
{
    /// <summary>R7-97(2012), table 5: p MPa, T K, v m³/kg, h kJ/kg, u kJ/kg, s kJ/(kg·K), cp kJ/(kg·K).</summary>
    [Theory]
    [InlineData(3, 300, .100215168e-2, .115331273e3, .112324818e3, .392294792, .417301218e1)]
    [InlineData(80, 300, .971180894e-3, .184142828e3, .106448356e3, .368563852, .401008987e1)]
    [InlineData(3, 500, .120241800e-2, .975542239e3, .971934985e3, .258041912e1, .465580682e1)]
    public void Liquid_MatchesTable5(double p, double temperature, double v, double h, double u, double s, double cp)
    {
        var pressure = p * 1e6;
        Printed.SameDigits(v, Steam.LiquidVolume(pressure, temperature), 9);
        Printed.SameDigits(h, Steam.LiquidEnthalpy(pressure, temperature) / 1000, 9);
        Printed.SameDigits(u, (Steam.LiquidEnthalpy(pressure, temperature) - pressure * Steam.LiquidVolume(pressure, temperature)) / 1000, 9);
        Printed.SameDigits(s, Steam.LiquidEntropy(pressure, temperature) / 1000, 9);
        Printed.SameDigits(cp, Steam.LiquidHeatCapacity(pressure, temperature) / 1000, 9);
    }

    /// <summary>R7-97(2012), table 15, columns as in table 5.</summary>
    [Theory]
    [InlineData(.0035, 300, .394913866e2, .254991145e4, .241169160e4, .852238967e1, .191300162e1)]
    [InlineData(.0035, 700, .923015898e2, .333568375e4, .301262819e4, .101749996e2, .208141274e1)]
    [InlineData(30, 700, .542946619e-2, .263149474e4, .246861076e4, .517540298e1, .103505092e2)]
    public void Vapour_MatchesTable15(double p, double temperature, double v, double h, double u, double s, double cp)
    {
        var pressure = p * 1e6;
        Printed.SameDigits(v, Steam.VapourVolume(pressure, temperature), 9);
        Printed.SameDigits(h, Steam.VapourEnthalpy(pressure, temperature) / 1000, 9);
        Printed.SameDigits(u, (Steam.VapourEnthalpy(pressure, temperature) - pressure * Steam.VapourVolume(pressure, temperature)) / 1000, 9);
        Printed.SameDigits(s, Steam.VapourEntropy(pressure, temperature) / 1000, 9);
        Printed.SameDigits(cp, Steam.VapourHeatCapacity(pressure, temperature) / 1000, 9);
    }

    /// <summary>R7-97(2012), table 35.</summary>
    [Theory]
    [InlineData(300, .353658941e-2)]
    [InlineData(500, .263889776e1)]
    [InlineData(600, .123443146e2)]
    public void SaturationPressure_MatchesTable35(double temperature, double megapascal) =>
        Printed.SameDigits(megapascal, Steam.SaturationPressure(temperature) / 1e6, 9);

    /// <summary>R7-97(2012), table 36.</summary>
    [Theory]
    [InlineData(.1, .372755919e3)]
    [InlineData(1, .453035632e3)]
    [InlineData(10, .584149488e3)]
    public void SaturationTemperature_MatchesTable36(double megapascal, double temperature) =>
        Printed.SameDigits(temperature, Steam.SaturationTemperature(megapascal * 1e6), 9);
}
