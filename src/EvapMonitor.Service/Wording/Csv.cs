namespace EvapMonitor.Service.Wording;

/// <summary>Cells of CSV files.</summary>
internal static class Csv
{
    /// <summary>
    /// A text from outside as a cell: quoted where needed, and with a leading apostrophe where a spreadsheet would take it for a formula.
    /// </summary>
    public static string Cell(string text)
    {
        if (text is [('=' or '+' or '-' or '@' or '\t' or '\r'), ..]) text = "'" + text;
        return text.AsSpan().IndexOfAny("\",\r\n") < 0 ? text : "\"" + text.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
    }
}
