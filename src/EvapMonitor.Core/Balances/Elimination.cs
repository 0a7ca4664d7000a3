namespace EvapMonitor.Core.Balances;

/// <summary>
/// Gauss-Jordan elimination of the unknowns of a linear system whose rows also hold measured quantities. What is left says which unknowns follow from the
/// measured quantities, which do not, and which rows bind measured quantities alone: the redundancy (Crowe, Garcia Campos and Hrymak 1983 reach the same by
/// projection). Columns: unknowns, then measured quantities, then the right side.
/// </summary>
internal sealed class Elimination
{
    /// <summary>An entry under this is none: rows and columns are scaled so that true entries are near 1.</summary>
    public const double Nothing = 1e-9;

    /// <summary>A pivot under this share of the largest entry of its row is not taken.</summary>
    private const double LeastShare = 0.1;

    /// <summary>A pivot under this has lost too many digits.</summary>
    private const double LeastPivot = 1e-7;

    private readonly int _unknowns, _width;
    private readonly int[] _entries;
    private double[] _a = [];
    private int[]? _touched;

    /// <summary>Prepares a system.</summary>
    /// <param name="unknowns">How many unknowns there are.</param>
    /// <param name="measured">How many measured quantities.</param>
    public Elimination(int unknowns, int measured)
    {
        (_unknowns, Right) = (unknowns, unknowns + measured);
        _width = Right + 1;
        _entries = new int[_width];
    }

    /// <summary>Index of the right side in a row.</summary>
    public int Right { get; }

    /// <summary>How many rows there are.</summary>
    public int Rows { get; private set; }

    /// <summary>Clears the system for a number of rows.</summary>
    /// <param name="rows">How many.</param>
    /// <param name="filled">Where the rows to come and their elimination by steps can leave entries; empty: anywhere.</param>
    public void Clear(int rows, int[] filled)
    {
        Rows = rows;
        if (_a.Length < rows * _width) _a = new double[rows * _width];
        if (_touched is null) _a.AsSpan().Clear();
        else foreach (int at in _touched) _a[at] = 0;
        _touched = filled.Length == 0 ? null : filled;
    }

    /// <summary>A row.</summary>
    public Span<double> Row(int row) => _a.AsSpan(row * _width, _width);

    /// <summary>Chooses pivots and eliminates by them: rows with few unknowns first, so that little fills up.</summary>
    /// <param name="allowed">By unknown: true when it may be eliminated.</param>
    /// <returns>Row and column of each pivot, in order.</returns>
    public (int Row, int Column)[] Choose(bool[] allowed)
    {
        _touched = null;
        var pivots = new List<(int, int)>();
        bool[] done = new bool[Rows];
        while (true)
        {
            (int row, int column, int fewest, double size) best = (-1, -1, int.MaxValue, 0);
            for (int row = 0; row < Rows; row++)
            {
                if (done[row]) continue;
                ReadOnlySpan<double> entries = Row(row)[.._unknowns];
                int count = 0, largest = -1;
                for (int column = 0; column < _unknowns; column++)
                {
                    if (!allowed[column] || double.Abs(entries[column]) < LeastPivot) continue;
                    count++;
                    if (largest < 0 || double.Abs(entries[column]) > double.Abs(entries[largest])) largest = column;
                }

                if (count == 0 || count > best.fewest || (count == best.fewest && double.Abs(entries[largest]) <= best.size)) continue;
                best = (row, Sparsest(entries, allowed, largest), count, double.Abs(entries[largest]));
            }

            if (best.row < 0) return [.. pivots];
            done[best.row] = true;
            pivots.Add((best.row, best.column));
            Eliminate(best.row, best.column);
        }
    }

    /// <summary>Works out once where anything can be in each step of an elimination, whatever the numbers.</summary>
    /// <param name="pivots">The pivots.</param>
    /// <param name="present">By row, by column: true where an entry can be; changed here.</param>
    /// <param name="filled">Places in the system where an entry can ever be.</param>
    public EliminationStep[] Plan((int Row, int Column)[] pivots, bool[][] present, out int[] filled)
    {
        bool[][] ever = [.. present.Select(row => (bool[])row.Clone())];
        var steps = new EliminationStep[pivots.Length];
        for (int p = 0; p < pivots.Length; p++)
        {
            (int row, int column) = pivots[p];
            bool[] its = present[row];
            int[] entries = [.. Enumerable.Range(0, _width).Where(k => k != column && its[k])];
            int[] rows = [.. Enumerable.Range(0, Rows).Where(other => other != row && present[other][column])];
            foreach (int other in rows)
            {
                foreach (int k in entries) present[other][k] = ever[other][k] = true;
                present[other][column] = false;
            }

            steps[p] = new EliminationStep(row, column, entries, rows);
        }

        filled = [.. ever.SelectMany((row, r) => Enumerable.Range(0, _width).Where(k => row[k]).Select(k => (r * _width) + k))];

        return steps;
    }

    /// <summary>Eliminates by steps worked out before; false when a pivot is too small here.</summary>
    public bool Run(EliminationStep[] steps)
    {
        foreach (EliminationStep step in steps)
        {
            Span<double> pivot = Row(step.Row);
            if (!(double.Abs(pivot[step.Column]) >= LeastPivot)) return false;
            double factor = 1 / pivot[step.Column];
            foreach (int k in step.Entries) pivot[k] *= factor;
            pivot[step.Column] = 1;
            foreach (int row in step.Rows)
            {
                Span<double> target = Row(row);
                double share = target[step.Column];
                if (share == 0) continue;
                foreach (int k in step.Entries) target[k] -= pivot[k] * share;
                target[step.Column] = 0;
            }
        }

        return true;
    }

    /// <summary>Of the entries that are large enough, the one whose column meets the fewest rows.</summary>
    private int Sparsest(ReadOnlySpan<double> entries, bool[] allowed, int largest)
    {
        int best = largest, fewest = int.MaxValue;
        for (int column = 0; column < _unknowns; column++)
        {
            if (!allowed[column] || double.Abs(entries[column]) < LeastShare * double.Abs(entries[largest])) continue;
            int meets = 0;
            for (int row = 0; row < Rows; row++)
            {
                if (double.Abs(_a[(row * _width) + column]) > Nothing) meets++;
            }

            if (meets < fewest) (best, fewest) = (column, meets);
        }

        return best;
    }

    /// <summary>Only where the pivot's row has an entry is anything to be subtracted, and that is in few places.</summary>
    private void Eliminate(int pivotRow, int column)
    {
        Span<double> pivot = Row(pivotRow);
        double factor = 1 / pivot[column];
        int count = 0;
        for (int k = 0; k < pivot.Length; k++)
        {
            if (pivot[k] == 0) continue;
            pivot[k] *= factor;
            if (k != column) _entries[count++] = k;
        }

        pivot[column] = 1;
        ReadOnlySpan<int> entries = _entries.AsSpan(0, count);
        for (int row = 0, at = column; row < Rows; row++, at += _width)
        {
            double share = _a[at];
            if (share == 0 || row == pivotRow) continue;
            Span<double> target = Row(row);
            foreach (int k in entries) target[k] -= pivot[k] * share;
            target[column] = 0;
        }
    }
}

/// <summary>One step of an elimination.</summary>
/// <param name="Row">The pivot's row.</param>
/// <param name="Column">Its column.</param>
/// <param name="Entries">Other columns in which the row can have an entry.</param>
/// <param name="Rows">Other rows that can have an entry in the column.</param>
internal sealed record EliminationStep(int Row, int Column, int[] Entries, int[] Rows);
