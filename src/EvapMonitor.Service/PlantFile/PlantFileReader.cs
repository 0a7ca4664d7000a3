using System.Text;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Reads a plant file. Bad text never throws: it gives problems.</summary>
public static class PlantFileReader
{
    /// <summary>Largest plant file, bytes in UTF-8.</summary>
    public const int LargestFile = 1 << 20;

    /// <summary>Reads the text of a plant file.</summary>
    /// <param name="text">The text; a byte order mark at its begin is allowed.</param>
    /// <returns>The site, or every problem that stands in its way.</returns>
    public static PlantFileResult Read(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        var findings = new Findings();
        Site? site = null;
        if (text.Length > LargestFile || Encoding.UTF8.GetByteCount(text) > LargestFile)
        {
            findings.At(1, 1, "a file of more than 1 MiB", "at most 1 MiB");
        }
        else
        {
            string body = text.StartsWith('\uFEFF') ? text[1..] : text;
            if (IsText(body, findings) && YamlText.Read(body, findings) is { } root) site = new SiteReader(findings).Read(root);
        }

        return new(findings.Any ? null : site, findings.Problems(), findings.Notes());
    }

    /// <summary>Reads the bytes of a plant file, which are UTF-8.</summary>
    /// <param name="bytes">The bytes as they came from disk or network.</param>
    public static PlantFileResult Read(ReadOnlySpan<byte> bytes)
    {
        if (bytes.Length > LargestFile) return Read(new string(' ', LargestFile + 1));
        try
        {
            return Read(new UTF8Encoding(false, throwOnInvalidBytes: true).GetString(bytes));
        }
        catch (DecoderFallbackException)
        {
            var findings = new Findings();
            findings.At(1, 1, "bytes that are not UTF-8", "text in UTF-8");
            return new(null, findings.Problems(), []);
        }
    }

    /// <summary>
    /// Control characters are refused here: the YAML scanner takes a zero character for the end and would drop what follows.
    /// </summary>
    private static bool IsText(string text, Findings findings)
    {
        int line = 1;
        int begin = 0;
        for (int i = 0; i < text.Length; i++)
        {
            char c = text[i];
            bool half = char.IsSurrogate(c) && !(char.IsHighSurrogate(c) && i + 1 < text.Length && char.IsLowSurrogate(text[i + 1]))
                && !(char.IsLowSurrogate(c) && i > 0 && char.IsHighSurrogate(text[i - 1]));
            if (half || c is '\uFEFF' or '\uFFFE' or '\uFFFF' || (char.IsControl(c) && c is not ('\n' or '\r' or '\t' or '\u0085')))
            {
                findings.At(line, i - begin + 1, Invariant($"the character U+{(int)c:X4}"), "text without control characters");
                return false;
            }

            if (c == '\n' || (c == '\r' && (i + 1 == text.Length || text[i + 1] != '\n')))
            {
                line++;
                begin = i + 1;
            }
        }

        return true;
    }
}
