namespace EvapMonitor.Core.Balances;

/// <summary>The chest: what condenses, what it gives up, what passes through the surface; condensate that flashes; where the vapour goes.</summary>
public sealed partial class LineEquations
{
    private void CarryHeating(int k, double factor)
    {
        int from = _graph.Heating[k].From, flow = _at.Heating[k];
        if (from == LineGraph.Steam) Carry(flow, _steam, _at.SteamPressure, _at.SteamSuperheat, factor);
        else if (from >= 0) Carry(flow, _effects[from].Vapour, _at.Effects[from].VapourPressure, _at.Effects[from].Boiling, factor);
        else Product(flow, _at.Recompressors[_graph.Heating[k].Recompressor].Enthalpy, factor);
    }

    private void ChestSide(int i)
    {
        EffectVariables at = _at.Effects[i];
        string name = EffectAt(i).Name;
        double vented = 1 - _x[at.Vent], kept = 1 - _x[at.HeatLoss];
        _rows.Begin("chest mass", name, _flow);
        Term(at.Condensate);
        double before = _rows.Residual(_rows.Count - 1);
        ChestMass(i, -vented);
        // Residual so far less the condensate is −(1 − v)·M, so its slope by v is M.
        _rows.Slope(at.Vent, (before - _rows.Residual(_rows.Count - 1)) / vented);

        // Q = (1 − loss)·[(1 − vent)·Σ m·h − G·h_condensate], by (1 − loss) as a whole.
        _rows.Begin("chest heat", name, _heat);
        ChestHeat(i, -kept * vented);
        double entered = -_rows.Residual(_rows.Count - 1);
        Carry(at.Condensate, _effects[i].Condensate, at.ChestPressure, at.Subcooling, kept);
        double given = -_rows.Residual(_rows.Count - 1);
        _rows.Slope(at.Vent, entered / vented);
        _rows.Slope(at.HeatLoss, given / kept);
        Term(at.Duty);

        _rows.Begin("heating temperature", name, 10);
        Term(at.Heating);
        _rows.Value(-_effects[i].Heating.Value);
        _rows.Slope(at.ChestPressure, -_effects[i].Heating.First);
    }

    /// <summary>Adds factor times all that enters a chest.</summary>
    private void ChestMass(int i, double factor)
    {
        for (int k = 0; k < _at.Heating.Length; k++)
        {
            if (_graph.Heating[k].To == i) Term(_at.Heating[k], factor);
        }

        for (int j = 0; j < _effects.Length; j++)
        {
            if (_graph.FlashTo[j] == i) Term(_at.Effects[j].FlashVapour, factor);
        }
    }

    /// <summary>Adds factor times the heat of all that enters a chest.</summary>
    private void ChestHeat(int i, double factor)
    {
        for (int k = 0; k < _at.Heating.Length; k++)
        {
            if (_graph.Heating[k].To == i) CarryHeating(k, factor);
        }

        int chest = _at.Effects[i].ChestPressure;
        for (int j = 0; j < _effects.Length; j++)
        {
            if (_graph.FlashTo[j] == i) Carry(_at.Effects[j].FlashVapour, _properties.SaturatedVapour(_x[chest]), chest, -1, factor);
        }
    }

    /// <summary>Q = U·A·(Ts − Tb); over several bodies U·ΣA = Σ U_b·A_b.</summary>
    private void Transfer(int i)
    {
        EffectVariables at = _at.Effects[i];
        double area = _areas[i], force = _x[at.Heating] - _x[at.Boiling], conductance = _x[at.Coefficient] * area;
        _rows.Begin("heat transfer", EffectAt(i).Name, _heat);
        Term(at.Duty);
        _rows.Value(-conductance * force);
        _rows.Slope(at.Coefficient, -area * force);
        _rows.Slope(at.Heating, -conductance);
        _rows.Slope(at.Boiling, conductance);
        if (_at.Bodies[i].Length == 0) return;
        _rows.Begin("bodies", EffectAt(i).Name, 1500 * area);
        Term(at.Coefficient, area);
        for (int b = 0; b < _at.Bodies[i].Length; b++) Term(_at.Bodies[i][b], -_graph.Bodies[i][b].Area);
    }

    /// <summary>Vapour goes to chests, to bleeds, into recompressors, and to a condenser where it heats nothing.</summary>
    private void VapourOf(int i)
    {
        EffectVariables at = _at.Effects[i];
        _rows.Begin("vapour", EffectAt(i).Name, _flow);
        Term(at.Vapour);
        for (int k = 0; k < _graph.Heating.Count; k++)
        {
            if (_graph.Heating[k].From == i) Term(_at.Heating[k], -1);
        }

        for (int b = 0; b < _at.Bleeds.Length; b++)
        {
            if (_graph.BleedFrom[b] == i) Term(_at.Bleeds[b], -1);
        }

        for (int r = 0; r < _at.Recompressors.Length; r++)
        {
            if (_graph.SuctionFrom[r] == i) Term(_at.Recompressors[r].Suction, -1);
        }

        if (at.ToCondenser >= 0) Term(at.ToCondenser, -1);
    }

    /// <summary>The pot: what enters saturated at one pressure leaves as vapour and condensate at the lower one. Heat is conserved.</summary>
    private void Flash(int i)
    {
        EffectVariables at = _at.Effects[i];
        if (at.Flashing < 0) return;
        string name = EffectAt(i).Name;
        int chest = _at.Effects[_graph.FlashTo[i]].ChestPressure;
        Sloped liquid = _properties.Condensate(_x[chest], 0), vapour = _properties.SaturatedVapour(_x[chest]);
        Sloped own = _properties.Condensate(_x[at.ChestPressure], 0);
        _rows.Begin("condensate to the pot", name, _flow);
        Term(at.Flashing, -1);
        Term(at.Condensate);
        for (int j = 0; j < _effects.Length; j++)
        {
            if (_graph.FlashTo[j] != i) continue;
            Term(_at.Effects[j].Flashing);
            Term(_at.Effects[j].FlashVapour, -1);
        }

        _rows.Begin("flash heat", name, _heat);
        Carry(at.Condensate, _effects[i].Condensate, at.ChestPressure, at.Subcooling);
        // What stayed liquid in pots at this effect's chest pressure goes along with its condensate.
        for (int j = 0; j < _effects.Length; j++)
        {
            if (_graph.FlashTo[j] != i) continue;
            Carry(_at.Effects[j].Flashing, own, at.ChestPressure, -1);
            Carry(_at.Effects[j].FlashVapour, own, at.ChestPressure, -1, -1);
        }
        Carry(at.Flashing, liquid, chest, -1, -1);
        Carry(at.FlashVapour, liquid, chest, -1);
        Carry(at.FlashVapour, vapour, chest, -1, -1);
    }

    /// <summary>A chest has the pressure of what heats it, less what the line loses. Steam beside another source comes through a valve and has its own.</summary>
    private void HeatingPressures()
    {
        for (int k = 0; k < _graph.Heating.Count; k++)
        {
            HeatingWay way = _graph.Heating[k];
            if (way.From == LineGraph.Steam && !_graph.BySteamAlone[way.To]) continue;
            _rows.Begin("chest pressure", _at.Keys[_at.Heating[k]].Place, 1e5);
            Term(_at.Effects[way.To].ChestPressure);
            Term(way.From == LineGraph.Steam ? _at.SteamPressure : way.From >= 0 ? _at.Effects[way.From].VapourPressure : _at.Recompressors[way.Recompressor].Pressure, -1);
            if (way.From != LineGraph.Steam) _rows.Value(EffectAt(way.To).Chest.LineLoss);
        }
    }
}
