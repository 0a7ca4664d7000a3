namespace EvapMonitor.Core.Balances;

/// <summary>A constraint by what it says and where.</summary>
/// <param name="Says">Such as "mass", "solids", "liquor heat".</param>
/// <param name="Place">The place, as of a variable.</param>
public readonly record struct ConstraintKey(string Says, string Place)
{
    /// <inheritdoc/>
    public override string ToString() => Place.Length == 0 ? Says : $"{Says} of {Place}";
}

/// <summary>
/// Residuals of a set of constraints and their derivatives, row by row with the entries that are not zero. Kept and filled anew at each state, so that an
/// iteration makes no garbage.
/// </summary>
public sealed class ConstraintRows
{
    private readonly List<int> _starts = [];
    private readonly List<int> _columns = [];
    private readonly List<double> _slopes = [];
    private readonly List<double> _residuals = [];
    private readonly List<double> _scales = [];
    private readonly List<ConstraintKey> _keys = [];

    /// <summary>How many rows there are.</summary>
    public int Count => _starts.Count;

    /// <summary>What a row says.</summary>
    public ConstraintKey Key(int row) => _keys[row];

    /// <summary>Residual of a row in its own unit; 0 when the constraint holds.</summary>
    public double Residual(int row) => _residuals[row];

    /// <summary>A size of the terms of a row, in its own unit; residual by scale is what is to be small.</summary>
    public double Scale(int row) => _scales[row];

    /// <summary>Columns of the entries of a row, each once.</summary>
    public ReadOnlySpan<int> Columns(int row) => System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_columns)[_starts[row]..EndOf(row)];

    /// <summary>Derivatives of a row, beside <see cref="Columns"/>.</summary>
    public ReadOnlySpan<double> Slopes(int row) => System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_slopes)[_starts[row]..EndOf(row)];

    internal void Clear()
    {
        _slopes.Clear();
        _residuals.Clear();
        _scales.Clear();
        _starts.Clear();
        _columns.Clear();
        _keys.Clear();
    }

    internal void Begin(string says, string place, double scale)
    {
        _keys.Add(new(says, place));
        _starts.Add(_columns.Count);
        _residuals.Add(0);
        _scales.Add(scale);
    }

    internal void Value(double value) => _residuals[^1] += value;

    internal void Slope(int column, double slope)
    {
        int found = _columns.IndexOf(column, _starts[^1]);
        if (found >= 0)
        {
            _slopes[found] += slope;
            return;
        }

        _columns.Add(column);
        _slopes.Add(slope);
    }

    private int EndOf(int row) => row + 1 < _starts.Count ? _starts[row + 1] : _columns.Count;
}
