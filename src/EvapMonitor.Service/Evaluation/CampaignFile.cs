using System.Globalization;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Writes campaigns.csv: a row for each campaign of each surface, times UTC, an absent value an empty cell.</summary>
internal sealed class CampaignFile : IDisposable
{
    private readonly StreamWriter _text;

    public CampaignFile(string path)
    {
        _text = new StreamWriter(path) { NewLine = "\n" };
        _text.WriteLine("line,effect,start,end,started_by,confidence,initial_resistance_m2k_w,final_resistance_m2k_w,removed_share,rate_m2k_w_per_day,law,body,initial_resistance_u,final_resistance_u,rate_u,production_hours,products");
    }

    /// <summary>Rows written.</summary>
    public long Rows { get; private set; }

    public void Write(string line, IReadOnlyList<Surface> surfaces)
    {
        foreach (Surface surface in surfaces)
        {
            foreach (Campaign campaign in surface.History.Campaigns)
            {
                Rows++;
                _text.Write($"{Csv.Cell(line)},{Csv.Cell(surface.Effect)},{Time(campaign.Start)},{(campaign.End is { } end && end < long.MaxValue ? Time(end) : "")},{Words.Of(campaign.StartedBy)}");
                Write(campaign.Confidence, "0.####");
                Write(campaign.InitialResistance.Value, "0.000000000");
                Write(campaign.FinalResistance.Value, "0.000000000");
                Write(campaign.RemovedShare, "0.####");
                Write(campaign.GrowthRate.Value, "0.0000E+0");
                // Which law it follows is not told by the growth of one campaign.
                _text.Write($",,{(surface.Name == surface.Effect ? "" : Csv.Cell(surface.Name))}");
                foreach (Measured value in (ReadOnlySpan<Measured>)[campaign.InitialResistance, campaign.FinalResistance]) Write(value.Standard, "0.000000000");
                Write(campaign.GrowthRate.Standard, "0.0000E+0");
                Write(campaign.ProductionHours, "0.##");
                _text.WriteLine($",{Csv.Cell(string.Join(' ', campaign.Products))}");
            }
        }
    }

    public void Dispose() => _text.Dispose();

    private static string Time(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at).ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture);

    private void Write(double value, string format)
    {
        _text.Write(',');
        if (double.IsFinite(value)) _text.Write(value.ToString(format, CultureInfo.InvariantCulture));
    }
}
