using EvapMonitor.Core.Plant;
using UnitsNet;
using UnitsNet.Units;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Units of pressure with what they are measured against. A unit that says nothing is absolute.</summary>
internal static class UnitsOfPressure
{
    private static readonly (string Written, PressureUnit Unit)[] Scales =
    [
        ("Pa", PressureUnit.Pascal), ("hPa", PressureUnit.Hectopascal), ("kPa", PressureUnit.Kilopascal), ("MPa", PressureUnit.Megapascal),
        ("bar", PressureUnit.Bar), ("mbar", PressureUnit.Millibar), ("psi", PressureUnit.PoundForcePerSquareInch),
        ("atm", PressureUnit.Atmosphere),
        ("mmHg", PressureUnit.MillimeterOfMercury), ("inHg", PressureUnit.InchOfMercury),
        ("kgf/cm2", PressureUnit.KilogramForcePerSquareCentimeter), ("kg/cm2", PressureUnit.KilogramForcePerSquareCentimeter),
        ("mmH2O", PressureUnit.MillimeterOfWaterColumn), ("mH2O", PressureUnit.MeterOfWaterColumn),
    ];

    /// <summary>1/760 of an atmosphere; the library rounds it.</summary>
    private const double Torr = 101_325.0 / 760;

    private static readonly (string Suffix, PressureReference Reference)[] Suffixes =
    [
        ("", PressureReference.Absolute), ("(a)", PressureReference.Absolute), ("a", PressureReference.Absolute),
        (" a", PressureReference.Absolute), (" abs", PressureReference.Absolute), ("(abs)", PressureReference.Absolute),
        ("(g)", PressureReference.Gauge), ("g", PressureReference.Gauge), (" g", PressureReference.Gauge),
        (" gauge", PressureReference.Gauge), ("(gauge)", PressureReference.Gauge),
        (" vacuum", PressureReference.Vacuum), (" vac", PressureReference.Vacuum), ("(vacuum)", PressureReference.Vacuum),
        ("(vac)", PressureReference.Vacuum),
    ];

    public static IEnumerable<UnitOfMeasure> All() => Scales
        .Select(scale => (scale.Written, Pascals: Pressure.From(1, scale.Unit).Pascals))
        .Append((Written: "torr", Pascals: Torr))
        .SelectMany(scale => Suffixes.Select(suffix =>
            new UnitOfMeasure(scale.Written + suffix.Suffix, Dimension.Pressure, scale.Pascals, 0, suffix.Reference)));
}
