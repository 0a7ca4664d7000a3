using System.Globalization;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Api;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Writes coefficients.csv: a row for each window and effect, times UTC, an absent value an empty cell.</summary>
internal sealed class CoefficientFile : IDisposable
{
    private const string Header =
        "time,line,effect,state,steady,heating_temperature_c,boiling_temperature_c,elevation_k,driving_force_k,duty_kw,coefficient_w_m2k,coefficient_u,coefficient_u_random,"
        + "clean_coefficient_w_m2k,cleanliness,fouling_resistance_m2k_w,reason,flags,head_corrected_driving_force_k,head_corrected_driving_force_u";

    private readonly StreamWriter _text;

    public CoefficientFile(string path)
    {
        _text = new StreamWriter(path) { NewLine = "\n" };
        _text.WriteLine(Header);
    }

    /// <summary>Rows written.</summary>
    public long Rows { get; private set; }

    public void Write(Line line, LineWindow window)
    {
        for (int i = 0; i < window.Effects.Count; i++)
        {
            Rows++;
            WriteRow(line.Name, line.Effects[i], window.Effects[i]);
        }
    }

    public void Dispose() => _text.Dispose();

    private void WriteRow(string line, Effect effect, EffectWindow window)
    {
        CleanExpectation? clean = CleanExpectation.Design(effect);
        Measured coefficient = window.Coefficient;
        _text.Write(DateTimeOffset.FromUnixTimeMilliseconds(window.At).ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture));
        _text.Write($",{TrendCsv.Cell(line)},{TrendCsv.Cell(effect.Name)},{Words.Of(window.State)},{Words.OfSteady(window.Steady)}");
        Write(window.HeatingTemperature.Value - 273.15, "0.0000");
        Write(window.BoilingTemperature.Value - 273.15, "0.0000");
        Write(window.Elevation.Value, "0.0000");
        Write(window.DrivingForce.Value, "0.0000");
        Write(window.Duty.Value / 1000, "0.000");
        Write(coefficient.Value, "0.0000");
        Write(coefficient.Standard, "0.0000");
        Write(coefficient.Random, "0.0000");
        Write(clean?.Coefficient ?? double.NaN, "0.####");
        Write(CleanComparison.Cleanliness(coefficient, clean).Value, "0.000000");
        Write(CleanComparison.Resistance(coefficient, clean).Value, "0.000000000");
        string flags = string.Join(' ', Flags(window));
        _text.Write($",{TrendCsv.Cell(window.Reason ?? "")},{flags}");
        Write(window.HeadCorrectedDrivingForce.Value, "0.0000");
        Write(window.HeadCorrectedDrivingForce.Standard, "0.0000");
        _text.WriteLine();
    }

    private static IEnumerable<string> Flags(EffectWindow window)
    {
        if (Words.Of(window.DutyFrom) is { } duty) yield return "duty:" + duty.Replace(' ', '-');
        if (Words.Of(window.HeatingFrom) is { } heating) yield return "heating:" + heating.Replace(' ', '-');
        if (Words.Of(window.BoilingFrom) is { } boiling) yield return "boiling:" + boiling.Replace(' ', '-').Replace(",", "", StringComparison.Ordinal);
        if (window.Extrapolated) yield return "extrapolated";
    }

    private void Write(double value, string format)
    {
        _text.Write(',');
        if (double.IsFinite(value)) _text.Write(value.ToString(format, CultureInfo.InvariantCulture));
    }
}
