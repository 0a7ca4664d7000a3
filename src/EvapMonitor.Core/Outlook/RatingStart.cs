using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using MathNet.Numerics.LinearAlgebra;

namespace EvapMonitor.Core.Outlook;

/// <summary>
/// A start for a rating: the line as a network of conductances, in which heat flows from steam to condenser, vapour carries on what the surface passed, and each
/// elevation takes its part of the temperature. Solids and elevations are brought up to date a few times. It need not be right, only near.
/// </summary>
internal sealed class RatingStart
{
    private const int Passes = 6;
    private const double Latent = 2.26e6;
    private readonly LineGraph _graph;
    private readonly LineVariables _at;
    private readonly LineProperties _properties;
    private readonly RatingConditions _conditions;
    private readonly RatingGivens _givens;
    private readonly int _n, _machines;
    private readonly double[] _conductance, _elevation, _sensible, _duty, _vapour, _flow, _solids, _liquor, _heating, _bleeds;
    private readonly double[] _ratio, _motive;
    private double[] _temperature;
    private double _last, _feed;

    public RatingStart(LineGraph graph, LineVariables variables, LineProperties properties, RatingConditions conditions, RatingGivens givens)
    {
        (_graph, _at, _properties, _conditions, _givens) = (graph, variables, properties, conditions, givens);
        (_n, _machines) = (graph.Line.Effects.Count, graph.Line.Recompressors.Count);
        _conductance = [.. graph.Bodies.Select(bodies => bodies.Sum(body => body.Area * conditions.Coefficients[body.Name]))];
        (_elevation, _sensible, _duty, _vapour) = (new double[_n], new double[_n], new double[_n], new double[_n]);
        (_flow, _solids) = (new double[_n + graph.Line.Tanks.Count], new double[_n + graph.Line.Tanks.Count]);
        (_liquor, _heating, _bleeds) = (new double[graph.Liquor.Count], new double[graph.Heating.Count], new double[graph.Line.Bleeds.Count]);
        _ratio = [.. graph.Line.Recompressors.Select(machine => machine.Kind == RecompressorKind.Thermal ? 1.4 : machine.Curve!.Points[machine.Curve.Points.Count / 2].Y)];
        _motive = new double[_machines];
        _temperature = new double[(2 * _n) + _machines + 1];
        Array.Fill(_solids, conditions.FeedSolids);
    }

    /// <summary>A typical liquor flow, kg/s: the feed as it came out.</summary>
    public double TypicalFlow => _feed;

    /// <summary>Makes the start.</summary>
    public double[] State()
    {
        _last = _properties.SaturationTemperature(_conditions.LastVapourPressure).Value;
        for (int pass = 0; pass < Passes; pass++)
        {
            Bleeds();
            Temperatures();
            Vapours();
            Flows();
            Elevations();
        }

        return Fill();
    }

    private double ThetaOf(int effect) => _temperature[effect];

    private double ChestOf(int effect) => _temperature[_n + effect];

    private void Bleeds()
    {
        for (int b = 0; b < _bleeds.Length; b++)
        {
            if (_givens.Values.TryGetValue(_at.Bleeds[b], out double given))
            {
                _bleeds[b] = given;
                continue;
            }

            Heater heater = _graph.Line.Heaters[_graph.BleedTo[b]];
            HeaterConditions at = _conditions.Heaters[heater.Name];
            double duty = at.Flow * (LineProperties.Enthalpy(heater.Liquor, at.Solids, at.Out).Value - LineProperties.Enthalpy(heater.Liquor, at.Solids, at.In).Value);
            _bleeds[b] = double.Max(0, duty / Latent);
        }
    }

    /// <summary>The network: unknown are the vapour of each effect, each chest, each discharge (K), and the steam where it is to be found.</summary>
    private void Temperatures()
    {
        int size = (2 * _n) + _machines + 1, adjusted = size - 1;
        var a = Matrix<double>.Build.Dense(size, size);
        var right = Vector<double>.Build.Dense(size);
        double wide = 50 * _conductance.Max();
        bool steamGiven = _conditions.SteamPressure is not null || !_graph.BySteamAlone.Contains(true);
        int freeMotive = steamGiven ? FreeMotive() : -1;
        for (int i = 0; i < _n; i++)
        {
            // Chest: what enters less Q = UA(chest − vapour − elevation).
            int chest = _n + i;
            if (_graph.BySteamAlone[i])
            {
                a[chest, chest] = 1;
                if (steamGiven) right[chest] = _properties.SaturationTemperature(_conditions.SteamPressure!.Value).Value;
                else a[chest, adjusted] = -1;
            }
            else
            {
                a[chest, chest] -= _conductance[i];
                a[chest, i] += _conductance[i];
                right[chest] -= _conductance[i] * _elevation[i];
            }

            // Vapour: what the surface passed and the liquor brought, less what goes on.
            if (_graph.ToCondenser[i])
            {
                a[i, i] = 1;
                right[i] = _last;
                continue;
            }

            a[i, chest] += _conductance[i];
            a[i, i] -= _conductance[i];
            right[i] += (_conductance[i] * _elevation[i]) - _sensible[i];
            for (int b = 0; b < _bleeds.Length; b++)
            {
                if (_graph.BleedFrom[b] == i) right[i] += _bleeds[b] * Latent;
            }
        }

        for (int k = 0; k < _graph.Heating.Count; k++)
        {
            HeatingWay way = _graph.Heating[k];
            int chest = _n + way.To, source = way.From >= 0 ? way.From : (2 * _n) + way.Recompressor;
            if (_graph.BySteamAlone[way.To]) continue;
            if (way.From == LineGraph.Steam)
            {
                right[chest] -= _givens.Values.GetValueOrDefault(_at.Heating[k]) * Latent;
                continue;
            }

            a[chest, source] += wide;
            a[chest, chest] -= wide;
            Draw(a, source, source, chest, wide);
        }

        for (int r = 0; r < _machines; r++) Machine(a, right, r, adjusted, freeMotive);
        if (steamGiven && freeMotive < 0) a[adjusted, adjusted] = 1;
        else
        {
            // The evaporation asked for fixes the steam.
            for (int i = 0; i < _n; i++)
            {
                a[adjusted, _n + i] += _conductance[i];
                a[adjusted, i] -= _conductance[i];
                right[adjusted] += (_conductance[i] * _elevation[i]) - _sensible[i];
            }

            right[adjusted] += _givens.Evaporation * Latent;
        }

        double[] found = a.LU().Solve(right).ToArray();
        if (Array.TrueForAll(found, double.IsFinite)) _temperature = found;
        for (int i = 0; i < _n; i++)
        {
            _duty[i] = _conductance[i] * (ChestOf(i) - ThetaOf(i) - _elevation[i]);
            _duty[i] = double.Max(_duty[i], 0.2 * _conductance[i]);
        }

        for (int r = 0; r < _machines; r++)
        {
            if (r == freeMotive) _motive[r] = double.Max(found[adjusted], 1e-3);
            double low = PressureAt(ThetaOf(_graph.SuctionFrom[r])), high = PressureAt(_temperature[(2 * _n) + r]);
            if (_graph.Line.Recompressors[r].Kind == RecompressorKind.Thermal) _ratio[r] = double.Clamp(high / low, 1.02, 6);
        }
    }

    /// <summary>What leaves a node through a wide way: from a vapour space at once, from a machine out of its suction too.</summary>
    private void Draw(Matrix<double> a, int row, int source, int chest, double wide)
    {
        if (row >= 2 * _n && _graph.Line.Recompressors[row - (2 * _n)].Kind == RecompressorKind.Mechanical)
        {
            row = _graph.SuctionFrom[row - (2 * _n)];
        }

        if (row < _n && _graph.ToCondenser[row]) return;
        a[row, source] -= wide;
        a[row, chest] += wide;
    }

    private void Machine(Matrix<double> a, Vector<double> right, int r, int adjusted, int freeMotive)
    {
        int node = (2 * _n) + r, suction = _graph.SuctionFrom[r];
        if (_graph.Line.Recompressors[r].Kind == RecompressorKind.Mechanical)
        {
            double low = double.Clamp(ThetaOf(suction) is > 273.2 and < 473 and var known ? known : _last, 274, 470), pressure = PressureAt(low);
            a[node, node] = 1;
            a[node, suction] = -1;
            right[node] = _properties.SaturationTemperature(_ratio[r] * pressure).Value - low;
            return;
        }

        double drawn = double.Max(0.05, _graph.Line.Recompressors[r].Curve!.At(_ratio[r]).Value);
        if (r == freeMotive)
        {
            a[node, adjusted] += (1 + drawn) * Latent;
            if (!_graph.ToCondenser[suction]) a[suction, adjusted] -= drawn * Latent;
            return;
        }

        _motive[r] = _conditions.Motive[_graph.Line.Recompressors[r].Name].Flow ?? 0;
        right[node] -= _motive[r] * (1 + drawn) * Latent;
        if (!_graph.ToCondenser[suction]) right[suction] += _motive[r] * drawn * Latent;
    }

    private int FreeMotive()
    {
        for (int r = 0; r < _machines; r++)
        {
            Recompressor machine = _graph.Line.Recompressors[r];
            if (machine.Kind == RecompressorKind.Thermal && _conditions.Motive[machine.Name].Flow is null) return r;
        }

        return -1;
    }

    private void Vapours()
    {
        for (int i = 0; i < _n; i++) _vapour[i] = double.Max((_duty[i] + _sensible[i]) / Latent, 0.1 * _duty[i] / Latent);
        double sum = _vapour.Sum();
        if (!double.IsNaN(_givens.Evaporation))
        {
            for (int i = 0; i < _n; i++) _vapour[i] *= _givens.Evaporation / sum;
            sum = _givens.Evaporation;
        }

        double byFeed = _givens.FeedFlow;
        _feed = !double.IsNaN(byFeed) ? byFeed : _conditions.ProductSolids is { } product ? sum / (1 - (_conditions.FeedSolids / product)) : 1.5 * sum;
        if (_feed < 1.02 * sum)
        {
            for (int i = 0; i < _n; i++) _vapour[i] *= 0.9 * _feed / sum;
        }
    }

    private void Flows()
    {
        var done = new HashSet<int> { LineGraph.Feed };
        double[] heat = new double[_n];
        for (int round = 0; round <= _flow.Length; round++)
        {
            for (int node = LineGraph.Feed; node < _flow.Length; node++)
            {
                int at = node;
                if (node != LineGraph.Feed)
                {
                    List<int> into = [.. Enumerable.Range(0, _liquor.Length).Where(k => _graph.Liquor[k].To == at)];
                    if (done.Contains(node) || into.Exists(k => !done.Contains(_graph.Liquor[k].From))) continue;
                    double entering = into.Sum(k => _liquor[k]), solids = into.Sum(k => _liquor[k] * SolidsOf(_graph.Liquor[k].From));
                    _flow[node] = node < _n ? double.Max(entering - _vapour[node], 0.03 * entering) : entering;
                    _solids[node] = double.Min(0.9, solids / _flow[node]);
                    if (node < _n) heat[node] = into.Sum(k => _liquor[k] * (EnthalpyOf(_graph.Liquor[k].From) - EnthalpyOf(at)));
                    done.Add(node);
                }

                double leaving = node == LineGraph.Feed ? _feed : _flow[node], left = leaving;
                var rest = new List<int>();
                for (int k = 0; k < _liquor.Length; k++)
                {
                    if (_graph.Liquor[k].From != node) continue;
                    if (_graph.Liquor[k].Share is { } share) left -= _liquor[k] = share.Value * leaving;
                    else rest.Add(k);
                }

                foreach (int k in rest) _liquor[k] = left / rest.Count;
            }
        }

        // Half of the change at a time: hot liquor that flashes and the temperatures depend on each other.
        for (int i = 0; i < _n; i++) _sensible[i] = (_sensible[i] + double.Clamp(heat[i], -0.8 * _duty[i], 2 * _duty[i])) / 2;
    }

    private double SolidsOf(int node) => node == LineGraph.Feed ? _conditions.FeedSolids : _solids[node];

    private double EnthalpyOf(int node)
    {
        if (node == LineGraph.Feed) return _properties.LiquorEnthalpy(_conditions.FeedSolids, _conditions.FeedTemperature).Value;
        if (node >= _n) return EnthalpyOf(_graph.Liquor.First(way => way.To == node).From);
        return _properties.LiquorEnthalpy(_solids[node], ThetaOf(node) + _elevation[node]).Value;
    }

    private void Elevations()
    {
        for (int i = 0; i < _n; i++) _elevation[i] = _properties.Elevation(_solids[i], double.Clamp(ThetaOf(i), 280, 460), 0, out _).Value;
    }

    private static double PressureAt(double temperature) => Steam.SaturationPressure(double.Clamp(temperature, 276, 470));

    private double[] Fill()
    {
        double[] x = new double[_at.Count];
        void Set(int index, double value)
        {
            if (index >= 0) x[index] = value;
        }

        Set(_at.FeedFlow, _feed);
        Set(_at.Evaporation, _vapour.Sum());
        for (int k = 0; k < _liquor.Length; k++) Set(_at.Liquor[k].Flow, _liquor[k]);
        double product = Enumerable.Range(0, _liquor.Length).Where(k => _graph.Liquor[k].To == LineGraph.Product).Sum(k => _liquor[k]);
        Set(_at.ProductFlow, product);
        Set(_at.ProductSolids, _feed * _conditions.FeedSolids / product);
        for (int t = 0; t < _at.Tanks.Length; t++) Set(_at.Tanks[t].Flow, _flow[_n + t]);
        for (int i = 0; i < _n; i++)
        {
            EffectVariables at = _at.Effects[i];
            Set(at.Flow, _flow[i]);
            Set(at.Solids, _solids[i]);
            Set(at.Vapour, _vapour[i]);
            double pressure = PressureAt(ThetaOf(i));
            Set(at.VapourPressure, pressure);
            Set(at.Boiling, _properties.SaturationTemperature(pressure).Value + _elevation[i]);
            Set(at.ChestPressure, PressureAt(ChestOf(i)));
            Set(at.Heating, _properties.SaturationTemperature(PressureAt(ChestOf(i))).Value);
            Set(at.Duty, _duty[i]);
            Set(at.Condensate, _duty[i] / Latent);
            Set(at.Flashing, _duty[i] / Latent);
            if (_graph.FlashTo[i] >= 0) Set(at.FlashVapour, double.Max(0, 4200 * (ChestOf(i) - ChestOf(_graph.FlashTo[i])) / Latent) * _duty[i] / Latent);
            Set(at.Coefficient, _conductance[i] / _graph.Bodies[i].Sum(body => body.Area));
        }

        for (int k = 0; k < _heating.Length; k++)
        {
            int chest = _graph.Heating[k].To;
            Set(_at.Heating[k], _duty[chest] / Latent / _graph.Heating.Count(way => way.To == chest));
        }

        if (_graph.HasSteam)
        {
            int steam = Array.IndexOf(_graph.BySteamAlone, true);
            Set(_at.SteamPressure, steam >= 0 ? PressureAt(ChestOf(steam)) : _conditions.SteamPressure ?? 1e5);
            Set(_at.SteamFlow, Enumerable.Range(0, _heating.Length).Where(k => _graph.Heating[k].From == LineGraph.Steam).Sum(k => x[_at.Heating[k]]));
        }

        for (int b = 0; b < _bleeds.Length; b++) Set(_at.Bleeds[b], _bleeds[b]);
        for (int h = 0; h < _at.Heaters.Length; h++)
            Set(_at.Heaters[h].Duty, Latent * Enumerable.Range(0, _bleeds.Length).Where(b => _graph.BleedTo[b] == h).Sum(b => _bleeds[b]));
        for (int r = 0; r < _machines; r++) FillMachine(r, x, Set);
        for (int i = 0; i < _n; i++) Set(_at.Effects[i].ToCondenser, _vapour[i]);
        foreach ((int index, double value) in _givens.Values) x[index] = value;
        return x;
    }

    private void FillMachine(int r, double[] x, Action<int, double> set)
    {
        RecompressorVariables at = _at.Recompressors[r];
        double delivered = Enumerable.Range(0, _heating.Length).Where(k => _graph.Heating[k].Recompressor == r).Sum(k => x[_at.Heating[k]]);
        double low = PressureAt(ThetaOf(_graph.SuctionFrom[r])), high = PressureAt(_temperature[(2 * _n) + r]);
        set(at.Discharge, delivered);
        set(at.Suction, double.Max(0.1 * delivered, delivered - _motive[r]));
        set(at.Motive, _motive[r]);
        set(at.Pressure, high);
        set(at.Enthalpy, _properties.SaturatedVapour(high).Value + 5e4);
        set(at.Power, delivered * 2e5 * double.Log(double.Max(1.05, high / low)));
    }
}
