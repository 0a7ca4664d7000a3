using System.Globalization;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Writes balance.csv row by row: a row for each window and variable, times UTC, an absent value an empty cell.</summary>
internal sealed class BalanceFile(TextWriter text) : IDisposable
{
    private BalanceLayout? _layout;
    private string[] _names = [];
    private UnitOfMeasure[] _units = [];

    public BalanceFile(string path)
        : this(new StreamWriter(path) { NewLine = "\n" })
    {
    }

    /// <summary>Rows written.</summary>
    public long Rows { get; private set; }

    public void WriteHeader() => text.WriteLine("time,line,variable,unit,measured,reconciled,standard,correction_in_standards,class,suspect");

    public void Write(string line, long at, BalanceWindow balance)
    {
        if (_layout != balance.Layout) TakeLayout(balance.Layout);
        string start = $"{DateTimeOffset.FromUnixTimeMilliseconds(at).ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture)},{Csv.Cell(line)},";
        for (int k = 0; k < _names.Length; k++)
        {
            Rows++;
            text.Write(start);
            text.Write(_names[k]);
            WriteNumber(balance.Measured[k], _units[k].Offset, _units[k].Factor);
            WriteNumber(balance.Reconciled[k], _units[k].Offset, _units[k].Factor);
            WriteShort((float)balance.Standard[k] / _units[k].Factor);
            WriteShort(balance.InstrumentOf(k) is >= 0 and var place ? (float)balance.Correction[place] : double.NaN);
            text.Write(',');
            text.Write(Words.Of(balance.Class[k]));
            text.Write(',');
            text.WriteLine(Csv.Cell(BalanceWords.Suspicion(balance, k)));
        }
    }

    public void Dispose() => text.Dispose();

    private void TakeLayout(BalanceLayout layout)
    {
        _layout = layout;
        _units = [.. layout.Variables.Select(variable => BalanceUnits.Plain(variable.Kind))];
        _names = [.. layout.Variables.Select((variable, k) => $"{Csv.Cell(BalanceRow.NameOf(variable))},{_units[k].Written}")];
    }

    private void WriteNumber(double si, double offset, double factor)
    {
        text.Write(',');
        // With the figures that the store keeps, so that a file and the service's answer are alike letter for letter.
        if (double.IsFinite(si)) text.Write((((float)si - offset) / factor).ToString("G7", CultureInfo.InvariantCulture));
    }

    private void WriteShort(double value)
    {
        text.Write(',');
        if (double.IsFinite(value)) text.Write(value.ToString("G6", CultureInfo.InvariantCulture));
    }
}
