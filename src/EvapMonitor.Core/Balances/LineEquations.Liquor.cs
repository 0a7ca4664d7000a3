using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>The liquor: where it goes, total mass, solids, heat, boiling temperature.</summary>
public sealed partial class LineEquations
{
    private int OutOf(int node) =>
        node == LineGraph.Feed ? _at.FeedFlow : node < _graph.FirstTank ? _at.Effects[node].Flow : _at.Tanks[node - _graph.FirstTank].Flow;

    /// <summary>A tank keeps solids and temperature: its liquor is that of the effect before it.</summary>
    private int OriginOf(int node)
    {
        for (int k = 0; node >= _graph.FirstTank; k++)
        {
            if (_graph.Liquor[k].To != node) continue;
            (node, k) = (_graph.Liquor[k].From, -1);
        }

        return node;
    }

    private int SolidsOf(int node) => OriginOf(node) is >= 0 and var effect ? _at.Effects[effect].Solids : _at.FeedSolids;

    private void CarryLiquor(int flow, int from, double factor)
    {
        if (OriginOf(from) is >= 0 and var effect) Carry(flow, _effects[effect].Liquor, _at.Effects[effect].Solids, _at.Effects[effect].Boiling, factor);
        else Carry(flow, _feed, _at.FeedSolids, _at.FeedTemperature, factor);
    }

    /// <summary>Each source is shared out: stated shares, then the rest.</summary>
    private void LiquorWays()
    {
        for (int node = LineGraph.Feed; node < _graph.FirstTank + _at.Tanks.Length; node++)
        {
            int first = -1;
            for (int k = 0; k < _graph.Liquor.Count; k++)
            {
                LiquorWay way = _graph.Liquor[k];
                if (way.From != node) continue;
                _rows.Begin("liquor on the way", _at.Keys[_at.Liquor[k].Flow].Place, _flow);
                Term(_at.Liquor[k].Flow);
                if (way.Share is not null) Product(_at.Liquor[k].Share, OutOf(node), -1);
                else if (first >= 0) Term(_at.Liquor[first].Flow, -1);
                else
                {
                    first = k;
                    for (int other = 0; other < _graph.Liquor.Count; other++)
                    {
                        if (other != k && _graph.Liquor[other].From == node) Term(_at.Liquor[other].Flow);
                    }

                    Term(OutOf(node), -1);
                }
            }
        }

        for (int t = 0; t < _at.Tanks.Length; t++)
        {
            _rows.Begin("mass", _graph.Line.Tanks[t].Name, _flow);
            EnteringMass(_graph.FirstTank + t);
            Term(_at.Tanks[t].Flow, -1);
            Term(_at.Tanks[t].Accumulation, -1);
        }
    }

    private void LiquorSide(int i)
    {
        EffectVariables at = _at.Effects[i];
        string name = EffectAt(i).Name;
        _rows.Begin("mass", name, _flow);
        EnteringMass(i);
        Term(at.Flow, -1);
        Term(at.Accumulation, -1);
        Term(at.Vapour, -1);

        _rows.Begin("solids", name, _flow);
        EnteringSolids(i);
        Product(at.Flow, at.Solids, -1);
        Product(at.Accumulation, at.Solids, -1);

        _rows.Begin("liquor heat", name, _heat);
        for (int k = 0; k < _at.Liquor.Length; k++)
        {
            if (_graph.Liquor[k].To == i) CarryLiquor(_at.Liquor[k].Flow, _graph.Liquor[k].From, 1);
        }

        Term(at.Duty);
        Carry(at.Vapour, _effects[i].Vapour, at.VapourPressure, at.Boiling, -1);
        CarryLiquor(at.Flow, i, -1);
        CarryLiquor(at.Accumulation, i, -1);

        EffectProperties found = _effects[i];
        _rows.Begin("boiling temperature", name, 10);
        Term(at.Boiling);
        _rows.Value(-found.Water.Value - found.Elevation.Value);
        _rows.Slope(at.VapourPressure, -found.Water.First * (1 + found.Elevation.Second));
        _rows.Slope(at.Solids, -found.Elevation.First);
        _rows.Slope(_at.ElevationError, -found.ElevationStandard);
    }

    /// <summary>Product, evaporation and steam of the line as a whole.</summary>
    private void Whole()
    {
        _rows.Begin("product", "", _flow);
        EnteringMass(LineGraph.Product);
        Term(_at.ProductFlow, -1);
        _rows.Begin("product solids", "", _flow);
        EnteringSolids(LineGraph.Product);
        Product(_at.ProductFlow, _at.ProductSolids, -1);
        _rows.Begin("evaporation", "", _flow);
        foreach (EffectVariables effect in _at.Effects) Term(effect.Vapour);
        Term(_at.Evaporation, -1);
        if (!_graph.HasSteam) return;
        _rows.Begin("steam", "", _flow);
        for (int k = 0; k < _graph.Heating.Count; k++)
        {
            if (_graph.Heating[k].From == LineGraph.Steam) Term(_at.Heating[k]);
        }

        Term(_at.SteamFlow, -1);
    }

    private void EnteringMass(int node)
    {
        for (int k = 0; k < _at.Liquor.Length; k++)
        {
            if (_graph.Liquor[k].To == node) Term(_at.Liquor[k].Flow);
        }
    }

    private void EnteringSolids(int node)
    {
        for (int k = 0; k < _at.Liquor.Length; k++)
        {
            if (_graph.Liquor[k].To == node) Product(_at.Liquor[k].Flow, SolidsOf(_graph.Liquor[k].From));
        }
    }
}
