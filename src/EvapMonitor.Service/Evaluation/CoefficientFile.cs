using System.Globalization;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Evaluation;

/// <summary>
/// Writes coefficients.csv: a row for each window and effect, times UTC, an absent value an empty cell. What an effect would do if clean is only known when all
/// windows are: so the rows are written twice, first without it beside the file, then whole.
/// </summary>
internal sealed class CoefficientFile : IDisposable
{
    private const string Header =
        "time,line,effect,state,steady,heating_temperature_c,boiling_temperature_c,elevation_k,driving_force_k,duty_kw,coefficient_w_m2k,coefficient_u,coefficient_u_random,"
        + "clean_coefficient_w_m2k,cleanliness,fouling_resistance_m2k_w,reason,flags,head_corrected_driving_force_k,head_corrected_driving_force_u";

    /// <summary>Stands in a row where the clean part belongs.</summary>
    private const char Gap = '\u001f';

    private readonly string _path;
    private readonly StreamWriter _text;

    /// <summary>Begins the file.</summary>
    public CoefficientFile(string path)
    {
        _path = path;
        _text = new StreamWriter(Part) { NewLine = "\n" };
    }

    /// <summary>Rows written.</summary>
    public long Rows { get; private set; }

    private string Part => _path + ".part";

    /// <summary>Adds the rows of a window.</summary>
    public void Write(Line line, LineWindow window)
    {
        for (int i = 0; i < window.Effects.Count; i++)
        {
            Rows++;
            WriteRow(line.Name, line.Effects[i], window.Effects[i]);
        }
    }

    /// <summary>Writes the file: each row with what its effect would do if clean, in the order in which the rows came.</summary>
    /// <param name="compared">The comparisons, one for each row.</param>
    public void Complete(IEnumerable<CleanComparisonResult> compared)
    {
        _text.Dispose();
        using (var rows = new StreamReader(Part))
        using (var text = new StreamWriter(_path) { NewLine = "\n" })
        {
            text.WriteLine(Header);
            foreach (CleanComparisonResult one in compared)
            {
                string[] parts = rows.ReadLine()!.Split(Gap);
                text.Write(parts[0]);
                Write(text, one.CleanCoefficient.Value, "0.####");
                Write(text, one.Cleanliness.Value, "0.000000");
                Write(text, one.Resistance.Value, "0.000000000");
                text.WriteLine(parts[1]);
            }
        }

        File.Delete(Part);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _text.Dispose();
        File.Delete(Part);
    }

    private void WriteRow(string line, Effect effect, EffectWindow window)
    {
        Measured coefficient = window.Coefficient;
        _text.Write(DateTimeOffset.FromUnixTimeMilliseconds(window.At).ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture));
        _text.Write($",{Csv.Cell(line)},{Csv.Cell(effect.Name)},{Words.Of(window.State)},{Words.OfSteady(window.Steady)}");
        Write(_text, window.HeatingTemperature.Value - 273.15, "0.0000");
        Write(_text, window.BoilingTemperature.Value - 273.15, "0.0000");
        Write(_text, window.Elevation.Value, "0.0000");
        Write(_text, window.DrivingForce.Value, "0.0000");
        Write(_text, window.Duty.Value / 1000, "0.000");
        Write(_text, coefficient.Value, "0.0000");
        Write(_text, coefficient.Standard, "0.0000");
        Write(_text, coefficient.Random, "0.0000");
        _text.Write(Gap);
        string flags = string.Join(' ', Flags(window));
        _text.Write($",{Csv.Cell(window.Reason ?? "")},{flags}");
        Write(_text, window.HeadCorrectedDrivingForce.Value, "0.0000");
        Write(_text, window.HeadCorrectedDrivingForce.Standard, "0.0000");
        _text.WriteLine();
    }

    private static IEnumerable<string> Flags(EffectWindow window)
    {
        if (Words.Of(window.DutyFrom) is { } duty) yield return "duty:" + duty.Replace(' ', '-');
        if (Words.Of(window.HeatingFrom) is { } heating) yield return "heating:" + heating.Replace(' ', '-');
        if (Words.Of(window.BoilingFrom) is { } boiling) yield return "boiling:" + boiling.Replace(' ', '-').Replace(",", "", StringComparison.Ordinal);
        if (window.Extrapolated) yield return "extrapolated";
    }

    private static void Write(StreamWriter text, double value, string format)
    {
        text.Write(',');
        if (double.IsFinite(value)) text.Write(value.ToString(format, CultureInfo.InvariantCulture));
    }
}
