using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>Heaters on bleeds and recompressors.</summary>
public sealed partial class LineEquations
{
    private void Heaters()
    {
        for (int h = 0; h < _at.Heaters.Length; h++)
        {
            HeaterVariables at = _at.Heaters[h];
            Heater heater = _graph.Line.Heaters[h];
            _rows.Begin("heater duty", heater.Name, _heat);
            Term(at.Duty);
            Carry(at.Flow, LineProperties.Enthalpy(heater.Liquor, _x[at.Solids], _x[at.Out]), at.Solids, at.Out, -1);
            Carry(at.Flow, LineProperties.Enthalpy(heater.Liquor, _x[at.Solids], _x[at.In]), at.Solids, at.In);

            // A heater that no bleed heats is heated by something else.
            if (!_graph.BleedTo.Contains(h)) continue;
            // The bleeds condense at the pressure of their effect and give the duty.
            _rows.Begin("bleed heat", heater.Name, _heat);
            Term(at.Duty, -1);
            for (int b = 0; b < _at.Bleeds.Length; b++)
            {
                if (_graph.BleedTo[b] != h) continue;
                EffectVariables effect = _at.Effects[_graph.BleedFrom[b]];
                Carry(_at.Bleeds[b], _effects[_graph.BleedFrom[b]].Vapour, effect.VapourPressure, effect.Boiling);
                Carry(_at.Bleeds[b], _properties.Condensate(_x[effect.VapourPressure], 0), effect.VapourPressure, -1, -1);
            }
        }
    }

    private void Recompress(int r)
    {
        RecompressorVariables at = _at.Recompressors[r];
        Recompressor machine = _graph.Line.Recompressors[r];
        EffectVariables suction = _at.Effects[_graph.SuctionFrom[r]];
        bool thermal = machine.Kind == RecompressorKind.Thermal;
        _rows.Begin("mass", machine.Name, _flow);
        Term(at.Suction);
        Term(thermal ? at.Motive : at.Spray);
        Term(at.Discharge, -1);

        _rows.Begin("heat", machine.Name, _heat);
        Carry(at.Suction, _effects[_graph.SuctionFrom[r]].Vapour, suction.VapourPressure, suction.Boiling);
        if (thermal) Product(at.Motive, at.MotiveEnthalpy);
        else
        {
            Product(at.Efficiency, at.Power);
            Carry(at.Spray, _properties.Condensate(_x[at.Pressure], 0), at.Pressure, -1);
        }

        Product(at.Discharge, at.Enthalpy, -1);

        _rows.Begin("discharge", machine.Name, _flow);
        Term(at.Discharge);
        for (int k = 0; k < _graph.Heating.Count; k++)
        {
            if (_graph.Heating[k].Recompressor == r) Term(_at.Heating[k], -1);
        }

        if (!_withMachineCurves) return;
        if (thermal) Entrain(at, machine, suction);
        else Compress(at, machine, suction);
    }

    /// <summary>Vapour drawn = curve(discharge by suction pressure)·motive steam.</summary>
    private void Entrain(RecompressorVariables at, Recompressor machine, EffectVariables suction)
    {
        double low = _x[suction.VapourPressure], ratio = _x[at.Pressure] / low;
        (double drawn, double slope) = machine.Curve!.At(ratio);
        _rows.Begin("machine curve", machine.Name, _flow);
        Term(at.Suction);
        Term(at.Motive, -drawn);
        _rows.Slope(at.Pressure, -_x[at.Motive] * slope / low);
        _rows.Slope(suction.VapourPressure, _x[at.Motive] * slope * ratio / low);
    }

    /// <summary>Pressure ratio by the volume drawn; power by the isentropic work; spray takes the superheat away where there is any spray.</summary>
    private void Compress(RecompressorVariables at, Recompressor machine, EffectVariables suction)
    {
        double low = _x[suction.VapourPressure], flow = _x[at.Suction];
        Compression found = Compression.Of(low, _x[suction.Boiling], _x[at.Pressure]);
        (double ratio, double slope) = machine.Curve!.At(flow * found.Volume.Value);
        _rows.Begin("machine curve", machine.Name, 1e5);
        Term(at.Pressure);
        Term(suction.VapourPressure, -ratio);
        _rows.Slope(at.Suction, -low * slope * found.Volume.Value);
        _rows.Slope(suction.VapourPressure, -low * slope * flow * found.Volume.First);
        _rows.Slope(suction.Boiling, -low * slope * flow * found.Volume.Second);

        double efficiency = machine.Curve.IsentropicEfficiency;
        _rows.Begin("power", machine.Name, _heat);
        Product(at.Efficiency, at.Power, efficiency);
        _rows.Value(-flow * found.Work);
        _rows.Slope(at.Suction, -found.Work);
        _rows.Slope(suction.VapourPressure, -flow * found.WorkBySuctionPressure);
        _rows.Slope(suction.Boiling, -flow * found.WorkBySuctionTemperature);
        _rows.Slope(at.Pressure, -flow * found.WorkByDischargePressure);

        _rows.Begin("spray", machine.Name, machine.Spray is null ? _flow : 1e5);
        if (machine.Spray is null)
        {
            Term(at.Spray);
            return;
        }

        Sloped saturated = _properties.SaturatedVapour(_x[at.Pressure]);
        Term(at.Enthalpy);
        _rows.Value(-saturated.Value);
        _rows.Slope(at.Pressure, -saturated.First);
    }
}
