using System.Globalization;
using System.Text;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Service.Ingest.Files;

/// <summary>Reads a quality: good, uncertain, bad, or an OPC UA status code, whose two highest bits tell the severity (OPC 10000-4, 7.39).</summary>
internal static class QualityCodes
{
    /// <summary>Reads a quality field; an empty one is good.</summary>
    public static bool TryRead(ReadOnlySpan<byte> text, out Quality quality)
    {
        quality = Quality.Good;
        if (text.IsEmpty || Ascii.EqualsIgnoreCase(text, "good"u8)) return true;
        quality = Quality.Uncertain;
        if (Ascii.EqualsIgnoreCase(text, "uncertain"u8)) return true;
        quality = Quality.Bad;
        if (Ascii.EqualsIgnoreCase(text, "bad"u8)) return true;
        bool hexadecimal = text is [(byte)'0', (byte)'x' or (byte)'X', ..];
        if (!uint.TryParse(hexadecimal ? text[2..] : text, hexadecimal ? NumberStyles.AllowHexSpecifier : NumberStyles.None, CultureInfo.InvariantCulture, out uint code)) return false;
        quality = (code >> 30) switch
        {
            0 => Quality.Good,
            1 => Quality.Uncertain,
            _ => Quality.Bad,
        };
        return true;
    }
}
