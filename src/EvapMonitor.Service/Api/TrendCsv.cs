using System.Globalization;
using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Api;

/// <summary>A series as CSV, for those who ask for text/csv.</summary>
internal static class TrendCsv
{
    public static string Of(TrendWire trend)
    {
        var text = new StringBuilder("time,line,effect,quantity,unit,value,u,u_random,mark,reason,steady\r\n");
        for (int i = 0; i < trend.Value.Count; i++)
        {
            string reason = trend.Reason[i] < 0 ? "" : trend.Reasons[trend.Reason[i]];
            text.Append(CultureInfo.InvariantCulture, $"{trend.Start.AddSeconds(trend.OffsetS[i]):yyyy-MM-ddTHH:mm:ssZ},{Csv.Cell(trend.Line)},{Csv.Cell(trend.Effect)},{trend.Quantity},{trend.Unit},")
                .Append(CultureInfo.InvariantCulture, $"{trend.Value[i]:R},{trend.U[i]:R},{trend.URandom[i]:R},{trend.Mark[i]},{Csv.Cell(reason)},{Words.OfSteady(trend.Steady[i])}\r\n");
        }

        return text.ToString();
    }
}
