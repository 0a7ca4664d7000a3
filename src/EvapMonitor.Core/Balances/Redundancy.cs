using System.Numerics;
using System.Runtime.Intrinsics;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// What binds the measured quantities of a window to each other, and the corrections that satisfy it: of all corrections that do, the one with the least sum of
/// squares, each counted in its standard uncertainty.
/// </summary>
internal sealed class Redundancy
{
    private readonly Elimination _system;
    private readonly int _unknowns, _columns;
    private readonly double[] _correction, _systematicShare, _randomShare;
    private readonly List<int> _rows = [];
    private double[] _factor = [], _white = [], _right = [], _follows = [];
    private bool[] _isKnown = [];

    /// <summary>Prepares it.</summary>
    /// <param name="system">The system from which the unknowns are eliminated.</param>
    /// <param name="unknowns">How many unknowns come first in a row.</param>
    /// <param name="columns">How many measured quantities follow.</param>
    public Redundancy(Elimination system, int unknowns, int columns)
    {
        (_system, _unknowns, _columns) = (system, unknowns, columns);
        (_correction, _systematicShare, _randomShare) = (new double[columns], new double[columns], new double[columns]);
    }

    /// <summary>How many independent ways there are to check the readings.</summary>
    public int Degrees => _rows.Count;

    /// <summary>Sum of the squared corrections: chi-square with <see cref="Degrees"/> degrees of freedom when all readings are as good as stated.</summary>
    public double SumOfSquares { get; private set; }

    /// <summary>States how the uncertainty of a measured quantity is made up.</summary>
    public void SetShare(int column, double systematic, double random)
    {
        double total = double.Hypot(systematic, random);
        (_systematicShare[column], _randomShare[column]) = total > 0 ? (systematic / total, random / total) : (0, 0);
    }

    /// <summary>Correction of a measured quantity, in its standard uncertainty.</summary>
    public double Correction(int column) => _correction[column];

    /// <summary>Standard deviation of a correction, in the standard uncertainty of its reading: 0 where nothing checks the reading, near 1 where much does.</summary>
    public double Spread(int column)
    {
        double sum = 0;
        for (int k = 0; k < _rows.Count; k++) sum += _white[(k * _columns) + column] * _white[(k * _columns) + column];
        return double.Sqrt(sum);
    }

    /// <summary>Correlation of the corrections of two readings: at ±1 nothing can tell which of the two is wrong.</summary>
    public double Correlation(int column, int other)
    {
        double sum = 0, both = Spread(column) * Spread(other);
        for (int k = 0; k < _rows.Count; k++) sum += _white[(k * _columns) + column] * _white[(k * _columns) + other];
        return both > 0 ? sum / both : 0;
    }

    /// <summary>Finds the corrections after the unknowns were eliminated.</summary>
    public void Project((int Row, int Column)[] pivots)
    {
        Gather(pivots);
        int n = _rows.Count;
        if (_factor.Length < n * n) _factor = new double[n * n];
        if (_right.Length < n) _right = new double[n];
        if (_white.Length < n * _columns) _white = new double[n * _columns];
        for (int i = 0; i < n; i++)
        {
            ReadOnlySpan<double> one = Bound(i);
            for (int j = 0; j <= i; j++) _factor[(i * n) + j] = Dot(one, Bound(j));
            _right[i] = _system.Row(_rows[i])[_system.Right];
        }

        Decompose(n);
        Solve(_right.AsSpan(0, n), n);
        Array.Clear(_correction);
        for (int k = 0; k < n; k++) AddTo(_correction, Bound(k), _right[k]);
        SumOfSquares = Dot(_correction, _correction);
    }

    /// <summary>Prepares uncertainties and tests; to be called once, after the last step of a solution.</summary>
    public void Weigh()
    {
        // L⁻¹B, L the Cholesky factor of B·Bᵀ: its rows bind the measured quantities as B's do, and are at right angles and of length 1.
        int n = _rows.Count;
        if (_isKnown.Length < _system.Rows) (_isKnown, _follows) = (new bool[_system.Rows], new double[_system.Rows * _columns]);
        Array.Clear(_isKnown);
        for (int k = 0; k < n; k++)
        {
            Span<double> white = _white.AsSpan(k * _columns, _columns);
            double pivot = _factor[(k * n) + k];
            white.Clear();
            if (pivot == 0) continue;
            AddTo(white, Bound(k), 1 / pivot);
            for (int j = 0; j < k; j++)
            {
                double factor = _factor[(k * n) + j];
                if (factor != 0) AddTo(white, White(j), -factor / pivot);
            }
        }
    }

    /// <summary>By how much the unknown of a row changes, with the corrections made.</summary>
    public double Change(int row) => _system.Row(row)[_system.Right] - Dot(Measured(row), _correction);

    /// <summary>Adds factor times how the unknown of a row follows each reading, the corrections made anew.</summary>
    public void AddSensitivity(int row, double factor, Span<double> sum)
    {
        Span<double> follows = _follows.AsSpan(row * _columns, _columns);
        if (!_isKnown[row])
        {
            ReadOnlySpan<double> entries = Measured(row);
            entries.CopyTo(follows);
            for (int k = 0; k < _rows.Count; k++)
            {
                double along = Dot(entries, White(k));
                if (along != 0) AddTo(follows, White(k), -along);
            }

            _isKnown[row] = true;
        }

        AddTo(sum, follows, factor);
    }

    /// <summary>Standard uncertainty of the unknown of a row, with the corrections made, both parts together.</summary>
    public double Standard(int row)
    {
        if (_isKnown[row]) return double.Sqrt(Dot(_follows.AsSpan(row * _columns, _columns), _follows.AsSpan(row * _columns, _columns)));
        ReadOnlySpan<double> entries = Measured(row);
        double sum = Dot(entries, entries);
        for (int k = 0; k < _rows.Count; k++)
        {
            double along = Dot(entries, White(k));
            sum -= along * along;
        }

        return double.Sqrt(double.Max(0, sum));
    }

    /// <summary>Standard uncertainty, systematic and random part, of what follows the readings in a known way.</summary>
    public (double Systematic, double Random) Uncertainty(ReadOnlySpan<double> sensitivity)
    {
        (double systematic, double random) = (0, 0);
        for (int c = 0; c < _columns; c++)
        {
            double s = sensitivity[c] * _systematicShare[c], r = sensitivity[c] * _randomShare[c];
            systematic += s * s;
            random += r * r;
        }

        return (double.Sqrt(systematic), double.Sqrt(random));
    }

    private ReadOnlySpan<double> White(int k) => _white.AsSpan(k * _columns, _columns);

    private ReadOnlySpan<double> Bound(int k) => Measured(_rows[k]);

    private ReadOnlySpan<double> Measured(int row) => _system.Row(row).Slice(_unknowns, _columns);

    /// <summary>The rows without a pivot that bind measured quantities.</summary>
    private void Gather((int Row, int Column)[] pivots)
    {
        Span<bool> taken = stackalloc bool[_system.Rows];
        foreach ((int row, _) in pivots) taken[row] = true;
        _rows.Clear();
        for (int row = 0; row < taken.Length; row++)
        {
            if (taken[row]) continue;
            foreach (double entry in Measured(row))
            {
                if (!(double.Abs(entry) > Elimination.Nothing)) continue;
                _rows.Add(row);
                break;
            }
        }
    }

    /// <summary>Cholesky's method in place. A row that says again what others said gets no weight.</summary>
    private void Decompose(int n)
    {
        for (int i = 0; i < n; i++)
        {
            double whole = _factor[(i * n) + i];
            for (int j = 0; j <= i; j++)
            {
                double sum = _factor[(i * n) + j];
                for (int k = 0; k < j; k++) sum -= _factor[(i * n) + k] * _factor[(j * n) + k];
                if (j < i) _factor[(i * n) + j] = _factor[(j * n) + j] > 0 ? sum / _factor[(j * n) + j] : 0;
                else _factor[(i * n) + i] = sum > 1e-12 * whole ? double.Sqrt(sum) : 0;
            }
        }
    }

    private void Solve(Span<double> right, int n)
    {
        for (int i = 0; i < n; i++)
        {
            double sum = right[i], pivot = _factor[(i * n) + i];
            for (int k = 0; k < i; k++) sum -= _factor[(i * n) + k] * right[k];
            right[i] = pivot > 0 ? sum / pivot : 0;
        }

        for (int i = n - 1; i >= 0; i--)
        {
            double sum = right[i], pivot = _factor[(i * n) + i];
            for (int k = i + 1; k < n; k++) sum -= _factor[(k * n) + i] * right[k];
            right[i] = pivot > 0 ? sum / pivot : 0;
        }
    }

    /// <summary>Four sums side by side: faster, and the same on every machine.</summary>
    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        Vector256<double> sums = Vector256<double>.Zero;
        int i = 0;
        for (; i <= a.Length - Vector256<double>.Count; i += Vector256<double>.Count) sums += Vector256.Create(a[i..]) * Vector256.Create(b[i..]);
        double sum = Vector256.Sum(sums);
        for (; i < a.Length; i++) sum += a[i] * b[i];
        return sum;
    }

    private static void AddTo(Span<double> sum, ReadOnlySpan<double> one, double factor)
    {
        int i = 0;
        for (; i <= sum.Length - Vector<double>.Count; i += Vector<double>.Count)
            (new Vector<double>(sum[i..]) + (new Vector<double>(one[i..]) * factor)).CopyTo(sum[i..]);
        for (; i < sum.Length; i++) sum[i] += one[i] * factor;
    }
}
