using System.Collections.Frozen;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Wording;
using UnitsNet;
using UnitsNet.Units;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// The units as plants write them. Conversion factors come from UnitsNet where it has them to seven digits; a test holds all against
/// NIST SP 811.
/// </summary>
internal static class Units
{
    /// <summary>550 ft·lbf/s exactly; the library rounds it to 745.69 W.</summary>
    private const double HorsePower = 550 * 0.3048 * 0.45359237 * 9.80665;

    private static readonly FrozenDictionary<string, UnitOfMeasure> BySpelling = All().ToFrozenDictionary(
        u => u.Written, StringComparer.Ordinal);

    /// <summary>Every spelling that is known, after <see cref="Normalised"/>.</summary>
    public static IEnumerable<UnitOfMeasure> Known => BySpelling.Values;

    /// <summary>The unit, with its spelling as given; null when it is unknown.</summary>
    public static UnitOfMeasure? Find(string written) =>
        BySpelling.TryGetValue(Normalised(written), out UnitOfMeasure? unit) ? unit with { Written = written.Trim() } : null;

    /// <summary>One spelling for the many signs that mean the same: ² and 2, · and ., º and °, blanks.</summary>
    public static string Normalised(string written)
    {
        string text = string.Join(' ', written.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries))
            .Replace('²', '2').Replace('³', '3').Replace('·', '.').Replace('⋅', '.').Replace('*', '.').Replace('º', '°').Replace('˚', '°')
            .Replace("℃", "°C", StringComparison.Ordinal).Replace("℉", "°F", StringComparison.Ordinal);
        return text.Replace("^", "", StringComparison.Ordinal).Replace("° ", "°", StringComparison.Ordinal)
            .Replace(" (", "(", StringComparison.Ordinal).Replace(" /", "/", StringComparison.Ordinal).Replace(
                "/ ", "/", StringComparison.Ordinal);
    }

    /// <summary>What a person may write for a dimension, with an example.</summary>
    public static string Allowed(Dimension dimension) => dimension switch
    {
        Dimension.MassFlow => "a mass flow such as 30 t/h (t/h, kg/h, kg/s, t/d, lb/h)",
        Dimension.VolumeFlow => "a volume flow such as 30 m3/h (m3/h, m³/h, l/min, l/s)",
        Dimension.Temperature => "a temperature such as 60 degC (degC, °C, degF, °F, K)",
        Dimension.TemperatureDifference => "a temperature difference such as 0.5 K",
        Dimension.Pressure => "a pressure such as 1008 mbar (bar, bar(a), bar(g), mbar, kPa, Pa, MPa, psi, psi(g), mmHg, mmHg vacuum)",
        Dimension.Fraction => "a share such as 91 % (%, °Bx, kg/kg, g/kg)",
        Dimension.Length => "a length such as 1.2 m (m, mm, cm, ft)",
        Dimension.Area => "an area such as 1450 m2 (m2, m², ft2)",
        Dimension.Mass => "a mass such as 120 t (t, kg, lb)",
        Dimension.Power => "a power such as 850 kW (kW, MW, hp)",
        Dimension.HeatTransferCoefficient => "a heat-transfer coefficient such as 2900 W/(m2.K) (W/(m2.K), kW/(m2.K), Btu/(h.ft2.F))",
        Dimension.Duration => "a time such as 20 min (s, min, h, d)",
        _ => "a number",
    };

    /// <summary>The dimension in words.</summary>
    public static string Words(Dimension dimension)
    {
        string allowed = Allowed(dimension);
        int such = allowed.IndexOf(" such as", StringComparison.Ordinal);
        return such < 0 ? allowed : allowed[..such];
    }

    private static IEnumerable<UnitOfMeasure> All() =>
    [
        .. UnitsOfPressure.All(),
        .. Of(Dimension.MassFlow, MassFlowUnit.KilogramPerSecond, [
            ("t/h", MassFlowUnit.TonnePerHour), ("t/hr", MassFlowUnit.TonnePerHour), ("kg/h", MassFlowUnit.KilogramPerHour),
            ("kg/hr", MassFlowUnit.KilogramPerHour), ("kg/s", MassFlowUnit.KilogramPerSecond),
            ("kg/min", MassFlowUnit.KilogramPerMinute), ("t/d", MassFlowUnit.TonnePerDay), ("g/s", MassFlowUnit.GramPerSecond)]),
        .. Pounds(),
        .. Of(Dimension.VolumeFlow, VolumeFlowUnit.CubicMeterPerSecond, [
            ("m3/h", VolumeFlowUnit.CubicMeterPerHour), ("m3/hr", VolumeFlowUnit.CubicMeterPerHour),
            ("m3/s", VolumeFlowUnit.CubicMeterPerSecond), ("m3/min", VolumeFlowUnit.CubicMeterPerMinute),
            ("m3/d", VolumeFlowUnit.CubicMeterPerDay), ("l/h", VolumeFlowUnit.LiterPerHour), ("l/min", VolumeFlowUnit.LiterPerMinute),
            ("l/s", VolumeFlowUnit.LiterPerSecond), ("L/h", VolumeFlowUnit.LiterPerHour), ("L/min", VolumeFlowUnit.LiterPerMinute),
            ("L/s", VolumeFlowUnit.LiterPerSecond), ("ft3/h", VolumeFlowUnit.CubicFootPerHour),
            ("ft3/min", VolumeFlowUnit.CubicFootPerMinute), ("gpm(US)", VolumeFlowUnit.UsGallonPerMinute)]),
        .. Temperatures(TemperatureUnit.DegreeCelsius, TemperatureDeltaUnit.DegreeCelsius, "degC", "deg C", "°C"),
        .. Temperatures(TemperatureUnit.DegreeFahrenheit, TemperatureDeltaUnit.DegreeFahrenheit, "degF", "deg F", "°F"),
        .. Temperatures(TemperatureUnit.Kelvin, TemperatureDeltaUnit.Kelvin, "K"),
        new("%", Dimension.Fraction, 0.01), new("°Bx", Dimension.Fraction, 0.01), new("degBx", Dimension.Fraction, 0.01),
        new("°Brix", Dimension.Fraction, 0.01),
        new("kg/kg", Dimension.Fraction, 1), new("g/kg", Dimension.Fraction, 0.001), new("g/g", Dimension.Fraction, 1),
        .. Of(Dimension.Length, LengthUnit.Meter, [
            ("m", LengthUnit.Meter), ("cm", LengthUnit.Centimeter), ("mm", LengthUnit.Millimeter), ("ft", LengthUnit.Foot),
            ("in", LengthUnit.Inch)]),
        .. Of(
            Dimension.Area, AreaUnit.SquareMeter,
            [("m2", AreaUnit.SquareMeter), ("ft2", AreaUnit.SquareFoot), ("sqft", AreaUnit.SquareFoot)]),
        .. Of(Dimension.Mass, MassUnit.Kilogram, [("kg", MassUnit.Kilogram), ("t", MassUnit.Tonne), ("lb", MassUnit.Pound)]),
        .. Of(Dimension.Power, PowerUnit.Watt, [
            ("W", PowerUnit.Watt), ("kW", PowerUnit.Kilowatt), ("MW", PowerUnit.Megawatt)]),
        new("hp", Dimension.Power, HorsePower),
        .. Coefficients(),
        .. Of(Dimension.Duration, DurationUnit.Second, [
            ("s", DurationUnit.Second), ("min", DurationUnit.Minute), ("h", DurationUnit.Hour), ("hr", DurationUnit.Hour),
            ("d", DurationUnit.Day)]),
    ];

    private static IEnumerable<UnitOfMeasure> Of<T>(Dimension dimension, T si, IEnumerable<(string Written, T Unit)> units)
        where T : struct, Enum =>
        units.Select(u => new UnitOfMeasure(u.Written, dimension, UnitConverter.Convert(1, u.Unit, si)));

    private static IEnumerable<UnitOfMeasure> Temperatures(TemperatureUnit unit, TemperatureDeltaUnit step, params string[] spellings) =>
        spellings.Select(s => new UnitOfMeasure(
            s, Dimension.Temperature, TemperatureDelta.From(1, step).Kelvins, Temperature.From(0, unit).Kelvins));

    /// <summary>Built from the pound, because the library's own flows of pounds are rounded to six digits.</summary>
    private static IEnumerable<UnitOfMeasure> Pounds()
    {
        double pound = Mass.From(1, MassUnit.Pound).Kilograms;
        return new[] { ("lb/s", pound), ("lb/min", pound / 60), ("lb/h", pound / 3600), ("lb/hr", pound / 3600), ("klb/h", pound / 3.6) }
            .Select(u => new UnitOfMeasure(u.Item1, Dimension.MassFlow, u.Item2));
    }

    private static IEnumerable<UnitOfMeasure> Coefficients()
    {
        double btu = HeatTransferCoefficient.From(1, HeatTransferCoefficientUnit.BtuPerHourSquareFootDegreeFahrenheit).WattsPerSquareMeterKelvin;
        double kilocalorie = HeatTransferCoefficient.From(1, HeatTransferCoefficientUnit.KilocaloriePerHourSquareMeterDegreeCelsius).WattsPerSquareMeterKelvin;
        (string Energy, string Area, string[] Degrees, double Factor)[] forms =
        [
            ("W", "m2", ["K", "degC", "°C"], 1), ("kW", "m2", ["K", "degC", "°C"], 1000),
            ("Btu", "h.ft2", ["F", "degF", "°F"], btu), ("kcal", "h.m2", ["K", "degC", "°C"], kilocalorie),
        ];
        return forms.SelectMany(f => f.Degrees.SelectMany(degree => new[]
        {
            $"{f.Energy}/({f.Area}.{degree})", $"{f.Energy}/({f.Area} {degree})".Replace('.', ' '), $"{f.Energy}/{f.Area}.{degree}",
            $"{f.Energy}/{f.Area}/{degree}".Replace('.', '/'), $"{f.Energy}/{f.Area}{degree}",
        }.Select(s => new UnitOfMeasure(s, Dimension.HeatTransferCoefficient, f.Factor)))).DistinctBy(u => u.Written);
    }
}
