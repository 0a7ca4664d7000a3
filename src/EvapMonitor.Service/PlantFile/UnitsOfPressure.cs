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
        ("bar", PressureUnit.Bar), ("mbar", PressureUnit.Millibar), ("psi", PressureUnit.PoundForcePerSquareInch), ("atm", PressureUnit.Atmosphere),
        ("mmHg", PressureUnit.MillimeterOfMercury), ("inHg", PressureUnit.InchOfMercury), ("torr", PressureUnit.Torr),
        ("kgf/cm2", PressureUnit.KilogramForcePerSquareCentimeter), ("kg/cm2", PressureUnit.KilogramForcePerSquareCentimeter),
        ("mmH2O", PressureUnit.MillimeterOfWaterColumn), ("mH2O", PressureUnit.MeterOfWaterColumn),
    ];

    private static readonly (string Suffix, PressureReference Reference)[] Suffixes =
    [
        ("", PressureReference.Absolute), ("(a)", PressureReference.Absolute), ("a", PressureReference.Absolute),
        (" a", PressureReference.Absolute), (" abs", PressureReference.Absolute), ("(abs)", PressureReference.Absolute),
        ("(g)", PressureReference.Gauge), ("g", PressureReference.Gauge), (" g", PressureReference.Gauge),
        (" gauge", PressureReference.Gauge), ("(gauge)", PressureReference.Gauge),
        (" vacuum", PressureReference.Vacuum), (" vac", PressureReference.Vacuum), ("(vacuum)", PressureReference.Vacuum), ("(vac)", PressureReference.Vacuum),
    ];

    public static IEnumerable<UnitOfMeasure> All() => Scales.SelectMany(scale => Suffixes.Select(suffix => new UnitOfMeasure(
        scale.Written + suffix.Suffix, Dimension.Pressure, Pressure.From(1, scale.Unit).Pascals, 0, suffix.Reference)));
}
