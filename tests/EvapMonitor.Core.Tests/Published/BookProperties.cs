using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>
/// The rounded enthalpies of a book in place of the steam tables: tables over saturation temperature, joined by straight lines, J/kg and K. Saturation itself is
/// that of the steam tables, and the book's pressures are put in as the pressures of its temperatures.
/// </summary>
internal sealed class BookProperties : LineProperties
{
    private readonly (double T, double H)[] _vapour, _condensate;
    private readonly Func<double, double> _elevation;
    private readonly Func<double, double, double> _liquor;

    public BookProperties((double T, double H)[] vapour, (double T, double H)[] condensate, Func<double, double> elevation, Func<double, double, double> liquor)
        : base(new Water { Name = "book" })
    {
        (_vapour, _condensate, _elevation, _liquor) = ([.. vapour.OrderBy(row => row.T)], [.. condensate.OrderBy(row => row.T)], elevation, liquor);
    }

    public override Sloped VapourEnthalpy(double pressure, double temperature) => AtSaturation(_vapour, pressure);

    public override Sloped CondensateEnthalpy(double pressure, double temperature) => AtSaturation(_condensate, pressure);

    public override Sloped Elevation(double solids, double waterBoilingPoint, double error, out double standard)
    {
        standard = 0;
        return new(_elevation(solids), (_elevation(solids + 1e-6) - _elevation(solids - 1e-6)) / 2e-6);
    }

    public override Sloped LiquorEnthalpy(double solids, double temperature) => new(
        _liquor(solids, temperature), (_liquor(solids + 1e-6, temperature) - _liquor(solids - 1e-6, temperature)) / 2e-6,
        (_liquor(solids, temperature + 1e-3) - _liquor(solids, temperature - 1e-3)) / 2e-3);

    private Sloped AtSaturation((double T, double H)[] table, double pressure)
    {
        Sloped saturation = SaturationTemperature(pressure);
        if (table.Length == 1) return new(table[0].H, 0);
        int i = 1;
        while (i < table.Length - 1 && saturation.Value > table[i].T) i++;
        double slope = (table[i].H - table[i - 1].H) / (table[i].T - table[i - 1].T);
        return new(table[i].H + (slope * (saturation.Value - table[i].T)), slope * saturation.First);
    }
}

/// <summary>Steam tables, but elevation and enthalpy of the liquor as a book gives them.</summary>
internal sealed class SteamTablesWithElevation(Liquor liquor, Func<double, double> elevation) : LineProperties(liquor)
{
    public override Sloped Elevation(double solids, double waterBoilingPoint, double error, out double standard)
    {
        standard = 0;
        return new(elevation(solids), (elevation(solids + 1e-6) - elevation(solids - 1e-6)) / 2e-6);
    }
}
