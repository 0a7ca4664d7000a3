using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>Which instrument of a plant file sees what of the line.</summary>
internal sealed partial class MeasurementEquations
{
    private void Liquors()
    {
        Liquor liquor = _properties.Liquor;
        bool water = liquor is Water;
        Flow(_variables.FeedFlow, _at.Feed.Flow, _variables.FeedSolids, _variables.FeedTemperature, liquor);
        Plain(_variables.FeedTemperature, _at.Feed.Temperature);
        int last = _graph.Liquor.FirstOrDefault(way => way.To == LineGraph.Product)?.From ?? LineGraph.Feed;
        while (last >= _graph.FirstTank) last = _graph.Liquor.First(way => way.To == last).From;
        if (last >= 0) Flow(_variables.ProductFlow, _at.Product.Flow, _variables.ProductSolids, _variables.Effects[last].Boiling, liquor);
        // Water carries no solids, whether or not somebody measures them.
        if (water) return;
        Plain(_variables.FeedSolids, _at.Feed.Solids);
        Plain(_variables.FeedSolids, _at.Feed.Laboratory);
        Plain(_variables.ProductSolids, _at.Product.Solids);
        Plain(_variables.ProductSolids, _at.Product.Laboratory);
    }

    private void Main()
    {
        if (!_graph.HasSteam) return;
        if (_at.SteamFlow >= 0 && _at.All[_at.SteamFlow].Unit.Dimension == Dimension.MassFlow) Plain(_variables.SteamFlow, _at.SteamFlow);
        (int super, int pressure) = (_variables.SteamSuperheat, _variables.SteamPressure);
        if (_graph.Line.Steam.PressureAt == SteamGaugePlace.Chest)
        {
            Plain(pressure, _at.SteamPressure);
            if (_at.SteamTemperature >= 0) _all.Add(new(Reading.Superheat, super, _at.SteamTemperature) { First = pressure });
            _certain.Add((super, [_at.SteamTemperature]));
            return;
        }

        // A valve keeps the enthalpy.
        if (_at.SteamPressure >= 0)
        {
            int sign = SignOf(_at.SteamPressure);
            // Without a thermometer, or while it is away, steam counts as saturated before the valve.
            if (_at.SteamTemperature >= 0)
                _all.Add(new(Reading.Throttled, super, _at.SteamPressure) { First = pressure, Second = _at.SteamTemperature, BySign = sign });
            _all.Add(new(Reading.ThrottledSaturated, super, _at.SteamPressure) { First = pressure, Unless = _at.SteamTemperature, BySign = sign });
        }

        _certain.Add((super, [_at.SteamPressure]));
    }

    private void Effect(int i)
    {
        Effect effect = _graph.Line.Effects[i];
        EffectPlaces places = _at.Effects[i];
        EffectVariables at = _variables.Effects[i];
        Plain(at.ChestPressure, places.ChestPressure);
        if (effect.Chest.TemperatureSeesSaturation) Plain(at.Heating, places.ChestTemperature);
        if (places.CondensateFlow >= 0 && _at.All[places.CondensateFlow].Unit.Dimension == Dimension.VolumeFlow)
            _all.Add(new(Reading.WaterVolume, at.Condensate, places.CondensateFlow) { First = at.Heating });
        else Plain(at.Condensate, places.CondensateFlow);
        if (places.CondensateTemperature >= 0) _all.Add(new(Reading.Subcooling, at.Subcooling, places.CondensateTemperature) { First = at.Heating });
        _certain.Add((at.Subcooling, [places.CondensateTemperature]));
        Plain(at.VapourPressure, places.VapourPressure);
        if (places.PressureDifference >= 0) _all.Add(new(Reading.Difference, at.ChestPressure, places.PressureDifference) { First = at.VapourPressure });
        Flow(at.Flow, places.LeavingFlow, at.Solids, at.Boiling, _properties.Liquor);
        if (_properties.Liquor is not Water) Plain(at.Solids, places.LeavingSolids);
        if (effect.Leaving.TemperatureSeesFlashedLiquor) Plain(at.Boiling, places.LeavingTemperature);
        Stored(i, at.Accumulation);
        // Without a level that tells, an effect stores nothing.
        _certain.Add((at.Accumulation, [_at.StoringLevels[i].Place]));
        Stated(at.HeatLoss, effect.HeatLoss, "heat loss of " + effect.Name);
        Stated(at.Vent, effect.Vent, "vent of " + effect.Name);
    }

    private void Others()
    {
        Line line = _graph.Line;
        for (int k = 0; k < _graph.Liquor.Count; k++)
        {
            if (_graph.Liquor[k].Share is { } share)
                Stated(_variables.Liquor[k].Share, share, $"share of {_graph.NameOf(_graph.Liquor[k].From)} to {_graph.NameOf(_graph.Liquor[k].To)}");
        }

        for (int t = 0; t < line.Tanks.Count; t++) Stored(line.Effects.Count + t, _variables.Tanks[t].Accumulation);
        for (int b = 0; b < line.Bleeds.Count; b++) Plain(_variables.Bleeds[b], _at.BleedFlows[b]);
        for (int h = 0; h < line.Heaters.Count; h++)
        {
            HeaterVariables at = _variables.Heaters[h];
            HeaterPlaces places = _at.Heaters[h];
            Flow(at.Flow, places.Flow, at.Solids, at.In, line.Heaters[h].Liquor);
            if (line.Heaters[h].Liquor is not Water) Plain(at.Solids, places.Solids);
            // As the plant file says: without a word about its solids, what is heated has those of the feed.
            if (line.Heaters[h].Solids is null && line.Heaters[h].Liquor is not Water) _all.Add(new(Reading.Same, at.Solids, -1) { First = _variables.FeedSolids });
            Plain(at.In, places.In);
            Plain(at.Out, places.Out);
        }

        for (int r = 0; r < line.Recompressors.Count; r++)
        {
            Recompressor machine = line.Recompressors[r];
            RecompressorPlaces places = _at.Recompressors[r];
            RecompressorVariables at = _variables.Recompressors[r];
            if (machine.Kind == RecompressorKind.Thermal)
            {
                Plain(at.Motive, places.MotiveFlow);
                if (places.MotivePressure < 0) continue;
                int sign = SignOf(places.MotivePressure);
                if (places.MotiveTemperature >= 0)
                    _all.Add(new(Reading.Enthalpy, at.MotiveEnthalpy, places.MotivePressure) { Second = places.MotiveTemperature, BySign = sign });
                // Without a thermometer, or while it is away, motive steam counts as saturated.
                _all.Add(new(Reading.Saturated, at.MotiveEnthalpy, places.MotivePressure) { Unless = places.MotiveTemperature, BySign = sign });
                continue;
            }

            Plain(at.Power, places.Power);
            Plain(at.Spray, places.Spray);
            if (machine.Spray is null) _certain.Add((at.Spray, []));
            Stated(at.Efficiency, machine.Efficiency, "efficiency of " + machine.Name);
        }
    }

    private void Stored(int vessel, int variable)
    {
        (int place, double mass) = _at.StoringLevels[vessel];
        if (place >= 0) _all.Add(new(Reading.Stored, variable, place) { Factor = mass });
    }

    private void Flow(int variable, int place, int solids, int temperature, Liquor liquor)
    {
        if (place < 0) return;
        if (_at.All[place].Unit.Dimension == Dimension.VolumeFlow) _all.Add(new(Reading.LiquorVolume, variable, place) { First = solids, Other = temperature, Liquor = liquor });
        else Plain(variable, place);
    }

    private void Plain(int variable, int place)
    {
        if (place >= 0) _all.Add(new(Reading.Plain, variable, place) { BySign = SignOf(place) });
    }

    private void Stated(int variable, UncertainShare share, string name) => Stated(variable, share.Value, share.Standard, name);

    private void Stated(int variable, double value, double standard, string name)
    {
        _stated.Add((variable, value, standard, name));
        if (standard > 0) _all.Add(new(Reading.Stated, variable, -1) { Column = AirColumn + _stated.Count });
    }

    private int SignOf(int place) => Conditioning.Atmosphere.SignOf(_at.All[place]);
}
