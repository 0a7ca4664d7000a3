using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Coefficients;

/// <summary>A line of two effects in forward feed with all instruments, and readings for an hour and a half; tests take away and change.</summary>
internal static class TestLine
{
    public static readonly UnitOfMeasure Kelvin = new("K", Dimension.Temperature, 1), Pascal = new("Pa", Dimension.Pressure, 1), Share = new("kg/kg", Dimension.Fraction, 1),
        Flow = new("kg/s", Dimension.MassFlow, 1);

    /// <summary>Readings that fit together: computed by hand from the steam tables with U 2000 and 1500 W/(m²·K), areas 300 and 320 m², water-like liquor.</summary>
    public static Dictionary<string, double> Values => new()
    {
        ["FF"] = 20, ["FX"] = 0.1, ["FT"] = 365, ["SF"] = 4, ["SP"] = 150_000, ["P1"] = 110_000, ["X1"] = 0.124, ["C1"] = 4, ["P2"] = 70_000, ["X2"] = 0.165, ["C2"] = 3.9,
    };

    public static Line Line(Func<Effect, Effect>? change = null, LiquorStream? feed = null, SteamMain? steam = null) => new()
    {
        Name = "line",
        Liquor = new LiquorChoice(Liquor, null, new Dictionary<int, Liquor>()),
        Feed = feed ?? new LiquorStream { Flow = Instrument("FF", Flow), Solids = Instrument("FX", Share), Temperature = Instrument("FT", Kelvin) },
        Steam = steam ?? new SteamMain { Flow = Instrument("SF", Flow), Pressure = Instrument("SP", Pascal), PressureAt = SteamGaugePlace.Chest },
        Effects =
        [
            (change ?? (same => same))(new Effect
            {
                Name = "E1", Heating = [HeatSource.Steam], Liquor = [LiquorSource.Feed], Area = 300, CleanCoefficient = 2000, HeatLoss = new(0, 0), Vent = new(0, 0),
                Chest = new Chest { CondensateFlow = Instrument("C1", Flow) },
                Vapour = new VapourSpace { Pressure = Instrument("P1", Pascal) },
                Leaving = new LeavingLiquor { Solids = Instrument("X1", Share) },
            }),
            new Effect
            {
                Name = "E2", Heating = [new HeatSource("E1")], Liquor = [new LiquorSource("E1")], Area = 320, HeatLoss = new(0, 0), Vent = new(0, 0),
                Chest = new Chest { CondensateFlow = Instrument("C2", Flow) },
                Vapour = new VapourSpace { Pressure = Instrument("P2", Pascal) },
                Leaving = new LeavingLiquor { Solids = Instrument("X2", Share) },
            },
        ],
    };

    public static Instrument Instrument(string signal, UnitOfMeasure unit) => new()
    {
        Signal = signal, Unit = unit, Accuracy = new Accuracy(0.01, 0, AccuracyMeaning.Standard),
    };

    /// <summary>Evaluates one window after an hour of constant readings.</summary>
    public static LineWindow Evaluate(Line line, Dictionary<string, double> values, FixedOrMeasured? atmosphere = null)
    {
        var site = new Site { Name = "site", TimeZone = "UTC", Atmosphere = atmosphere ?? new(101_325, null), HistoryFrom = DateTimeOffset.UnixEpoch, Lines = [line] };
        var readings = values.ToDictionary(pair => pair.Key, pair =>
        {
            var series = new ReadingSeries();
            for (int minute = 0; minute < 120; minute++) series.Add(new Reading(Milliseconds.Day + (minute * Milliseconds.Minute), pair.Value, Quality.Good));
            return series;
        });
        long from = Milliseconds.Day + (90 * Milliseconds.Minute);
        return new LineEvaluation(site, line).Evaluate(readings, from, from + (5 * Milliseconds.Minute), LineLog.Empty).Single();
    }

    public static Liquor Liquor { get; } = CustomLiquor.Create("it", new SolidsPolynomial([0, 0.05]), new SolidsPolynomial([4180, -20]), new SolidsPolynomial([998]));
}
