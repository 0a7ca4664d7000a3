using MathNet.Numerics.LinearAlgebra;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// Newton's method on the line equations: as many free variables as equations, the others stay as they are given. Steps are bounded and must bring the residuals
/// down; where that fails, the residuals of the start are taken away little by little instead of at once.
/// </summary>
public sealed class LineNewton
{
    private const double Solved = 1e-11, AllowedGrowth = 1.5;
    private const int MostSteps = 60, MostStepsOfStage = 12, MostStages = 60;
    private readonly LineEquations _equations;
    private readonly int[] _free;
    private readonly double[] _scale, _moved;
    private readonly StateSteps _steps;
    private readonly ConstraintRows _rows = new();
    private double[] _offset = [];

    /// <summary>Prepares the method. Not for use by two threads at a time.</summary>
    /// <param name="equations">The equations.</param>
    /// <param name="free">Indices of the free variables.</param>
    /// <param name="typicalFlow">A typical liquor flow, kg/s.</param>
    public LineNewton(LineEquations equations, IReadOnlyList<int> free, double typicalFlow)
    {
        ArgumentNullException.ThrowIfNull(equations);
        ArgumentNullException.ThrowIfNull(free);
        _equations = equations;
        _free = [.. free];
        _scale = equations.Variables.Scales(typicalFlow);
        _moved = new double[_scale.Length];
        _steps = new StateSteps(equations.Variables.Keys, _scale);
    }

    /// <summary>Steps taken in the last solution.</summary>
    public int Steps { get; private set; }

    /// <summary>Solves from a start, which holds the given variables too.</summary>
    /// <returns>The solution; null when none was found.</returns>
    /// <exception cref="InvalidOperationException">There are not as many free variables as equations.</exception>
    public double[]? Solve(double[] start)
    {
        ArgumentNullException.ThrowIfNull(start);
        Steps = 0;
        _offset = [];
        double[] x = [.. start];
        return Iterate(x, MostSteps) ? x : ByStages(start);
    }

    /// <summary>The largest residual of a state, by its scale, and what it belongs to.</summary>
    public (double Size, ConstraintKey Key) Worst(double[] state)
    {
        _offset = [];
        _equations.Evaluate(state, _rows);
        int worst = 0;
        for (int row = 1; row < _rows.Count; row++)
        {
            if (!(double.Abs(Residual(row)) <= double.Abs(Residual(worst)))) worst = row;
        }

        return (double.Abs(Residual(worst)), _rows.Key(worst));
    }

    /// <summary>Residuals shrink from those of the start to nothing, in stages whose length follows success.</summary>
    private double[]? ByStages(double[] start)
    {
        double[] x = [.. start];
        _offset = [];
        _equations.Evaluate(x, _rows);
        double[] whole = [.. Enumerable.Range(0, _rows.Count).Select(Residual)];
        if (!Array.TrueForAll(whole, double.IsFinite)) return null;
        double left = 1, stage = 0.2;
        for (int count = 0; count < MostStages && stage > 1e-4; count++)
        {
            double aim = double.Max(0, left - stage);
            _offset = [.. whole.Select(one => one * aim)];
            double[] tried = [.. x];
            if (!Iterate(tried, MostStepsOfStage))
            {
                stage /= 3;
                continue;
            }

            (x, left, stage) = (tried, aim, stage * 2);
            if (left == 0) return x;
        }

        return null;
    }

    private double Residual(int row) => (_rows.Residual(row) / _rows.Scale(row)) - (_offset.Length > 0 ? _offset[row] : 0);

    private double Norm(double[] x)
    {
        _equations.Evaluate(x, _rows);
        double sum = 0;
        for (int row = 0; row < _rows.Count; row++) sum += Residual(row) * Residual(row);
        return double.Sqrt(sum);
    }

    private bool Iterate(double[] x, int most)
    {
        int n = _free.Length;
        var jacobian = Matrix<double>.Build.Dense(n, n);
        var right = Vector<double>.Build.Dense(n);
        int[] place = new int[x.Length];
        Array.Fill(place, -1);
        for (int k = 0; k < n; k++) place[_free[k]] = k;
        double norm = Norm(x);
        if (_rows.Count != n) throw new InvalidOperationException($"The line has {_rows.Count} equations for {n} free variables.");
        double[] tried = new double[x.Length];
        for (int step = 0; step < most; step++, Steps++)
        {
            if (!double.IsFinite(norm)) return false;
            jacobian.Clear();
            for (int row = 0; row < n; row++)
            {
                right[row] = -Residual(row);
                ReadOnlySpan<int> columns = _rows.Columns(row);
                ReadOnlySpan<double> slopes = _rows.Slopes(row);
                for (int e = 0; e < columns.Length; e++)
                {
                    if (place[columns[e]] is >= 0 and var k) jacobian[row, k] = slopes[e] * _scale[columns[e]] / _rows.Scale(row);
                }
            }

            Vector<double> change = jacobian.LU().Solve(right);
            double largest = change.AbsoluteMaximum();
            if (!double.IsFinite(largest)) return false;
            if (norm < Solved || largest < 1e-13) return true;
            for (int k = 0; k < n; k++) _moved[_free[k]] = change[k] * _scale[_free[k]];
            double share = _steps.Allowed(x, _moved);
            double before = norm;
            for (int halved = 0; ; halved++)
            {
                _steps.Move(x, _moved, share, tried);
                norm = Norm(tried);
                // A small growth is let pass: the way to the solution may lead over a ridge.
                if (norm < before * (halved == 0 && step < 3 ? AllowedGrowth : 1) || before < 1e-9 || halved == 7) break;
                share /= 2;
            }

            tried.CopyTo(x, 0);
        }

        return norm < 1e-9;
    }
}
