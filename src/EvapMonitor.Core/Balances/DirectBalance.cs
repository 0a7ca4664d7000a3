using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// Finds temperatures and duties of each effect straight from what is measured there, without balancing one instrument against another.
/// A pure function of <see cref="LineInputs"/>: absent inputs are NaN and leave NaN behind, and nothing throws on a plant's odd reading.
/// </summary>
internal sealed class DirectBalance
{
    private readonly LineInstruments _at;
    private readonly LineRoutes _routes;
    private readonly Stream[] _leaving;
    private readonly double[] _vapourPressure;

    /// <summary>Prepares the balance of a line. Not for use by two threads at a time: it keeps its scratch space.</summary>
    public DirectBalance(LineInstruments instruments)
    {
        _at = instruments;
        _routes = new LineRoutes(instruments.Line);
        _leaving = new Stream[instruments.Effects.Count];
        _vapourPressure = new double[instruments.Effects.Count];
    }

    /// <summary>The routes of the line.</summary>
    public LineRoutes Routes => _routes;

    /// <summary>Solves one window.</summary>
    /// <param name="liquor">What the line boils.</param>
    /// <param name="inputs">The window's inputs.</param>
    /// <param name="effects">Receives the state of each effect, in plant-file order.</param>
    public void Solve(Liquor liquor, LineInputs inputs, Span<EffectState> effects)
    {
        effects.Clear();
        var feed = FeedOf(liquor, inputs);
        for (int i = 0; i < effects.Length; i++) effects[i].Area = _at.Surfaces[i].At(inputs);
        foreach (int i in _routes.LiquorOrder) LiquorSide(i, liquor, inputs, feed, ref effects[i]);
        for (int i = 0; i < effects.Length; i++) ChestSide(i, inputs, effects);
    }

    /// <summary>
    /// Water evaporated in the whole line, kg/s: feed less product, or from the solids of both; NaN when neither is known, and where a tank may fill or empty between the two.
    /// </summary>
    public double Evaporation(Liquor liquor, LineInputs inputs)
    {
        if (_at.Line.Tanks.Count > 0) return double.NaN;
        Stream feed = FeedOf(liquor, inputs);
        double product = MassFlow(_at.Product.Flow, inputs, liquor, ProductSolids(inputs), inputs.At(_at.Product.Temperature));
        double byFlows = feed.Flow - product;
        return double.IsNaN(byFlows) ? feed.Flow * (1 - (feed.Solids / ProductSolids(inputs))) : byFlows;
    }

    private readonly record struct Stream(double Flow, double Solids, double Enthalpy)
    {
        public double SolidsFlow => Flow * Solids;
    }

    private Stream FeedOf(Liquor liquor, LineInputs inputs)
    {
        double solids = inputs.At(_at.Feed.Solids), temperature = inputs.At(_at.Feed.Temperature);
        if (double.IsNaN(solids)) solids = inputs.At(_at.Feed.Laboratory);
        // Water carries no solids, whether or not somebody measures them.
        if (liquor is Water) solids = 0;
        return new Stream(MassFlow(_at.Feed.Flow, inputs, liquor, solids, temperature), solids, Physical.LiquorEnthalpy(liquor, solids, temperature));
    }

    private double ProductSolids(LineInputs inputs)
    {
        double solids = inputs.At(_at.Product.Solids);
        return double.IsNaN(solids) ? inputs.At(_at.Product.Laboratory) : solids;
    }

    /// <summary>Solids, elevation and boiling temperature of the leaving liquor, and the duty that the liquor received.</summary>
    private void LiquorSide(int i, Liquor liquor, LineInputs inputs, in Stream feed, ref EffectState state)
    {
        EffectPlaces at = _at.Effects[i];
        double flowIn = 0, solidsIn = 0, heatIn = 0;
        foreach (LiquorInflow inflow in _routes.Liquor[i])
        {
            Stream source = inflow.From == LineRoutes.Feed ? feed : _leaving[inflow.From];
            // What leaves a tank now need not be what enters it now.
            if (inflow.ThroughTank) source = new Stream(double.NaN, double.NaN, double.NaN);
            flowIn += inflow.Share * source.Flow;
            solidsIn += inflow.Share * source.SolidsFlow;
            heatIn += inflow.Share * source.Flow * source.Enthalpy;
        }

        double solids = inputs.At(at.LeavingSolids);
        if (double.IsNaN(solids) && _routes.LeavesLine[i]) solids = ProductSolids(inputs);
        if (liquor is Water) solids = 0;
        if (double.IsNaN(solids))
        {
            int flowPlace = at.LeavingFlow >= 0 ? at.LeavingFlow : _routes.LeavesLine[i] ? _at.Product.Flow : -1;
            if (flowPlace >= 0 && _at.All[flowPlace].Unit.Dimension == Dimension.MassFlow) solids = solidsIn / inputs.At(flowPlace);
        }

        state.Solids = solids = solids is >= 0 and < 1 ? solids : double.NaN;
        BoilingTemperature(i, liquor, inputs, ref state);
        double flow = MassFlow(at.LeavingFlow, inputs, liquor, solids, state.BoilingTemperature);
        if (double.IsNaN(flow) && _routes.LeavesLine[i]) flow = MassFlow(_at.Product.Flow, inputs, liquor, solids, state.BoilingTemperature);
        if (double.IsNaN(flow)) flow = solidsIn / solids;
        double enthalpy = Physical.LiquorEnthalpy(liquor, solids, state.BoilingTemperature);
        _leaving[i] = new Stream(flow, solids, enthalpy);
        state.Evaporation = flowIn - flow;
        state.Duty[(int)DutySource.Liquor] =
            HeatBalance.LiquorDuty(heatIn, flow, enthalpy, state.Evaporation, Physical.VapourEnthalpy(_vapourPressure[i], state.BoilingTemperature));
    }

    private void BoilingTemperature(int i, Liquor liquor, LineInputs inputs, ref EffectState state)
    {
        double pressure = inputs.At(_at.Effects[i].VapourPressure);
        var source = BoilingTemperatureSource.VapourPressure;
        if (double.IsNaN(pressure) && HeatedChestPressure(i, inputs) is { } chest) (pressure, source) = (chest, BoilingTemperatureSource.HeatedChestPressure);
        double saturation = Physical.SaturationTemperature(pressure);
        double liquorTemperature = _at.Line.Effects[i].Leaving.TemperatureSeesFlashedLiquor ? inputs.At(_at.Effects[i].LeavingTemperature) : double.NaN;
        state.Elevation = double.NaN;
        if (!double.IsNaN(saturation) && !double.IsNaN(state.Solids))
        {
            PropertyValue elevation = liquor.BoilingPointElevation(state.Solids, saturation);
            state.Elevation = elevation.Value + (inputs.ElevationError * elevation.Standard);
            state.Extrapolated |= elevation.Extrapolated;
        }

        state.BoilingTemperature = saturation + state.Elevation;
        state.BoilingFrom = source;
        if (double.IsNaN(state.BoilingTemperature))
        {
            state.BoilingTemperature = liquorTemperature;
            state.BoilingFrom = double.IsNaN(liquorTemperature) ? BoilingTemperatureSource.None : BoilingTemperatureSource.LiquorThermometer;
            // Without a gauge the pressure of the vapour is the one at which the liquor, less its elevation, boils.
            if (double.IsNaN(pressure) && !double.IsNaN(state.Solids) && Physical.IsSaturated(liquorTemperature))
            {
                PropertyValue elevation = liquor.BoilingPointElevation(state.Solids, liquorTemperature);
                state.Elevation = elevation.Value + (inputs.ElevationError * elevation.Standard);
                pressure = Physical.SaturationPressure(liquorTemperature - state.Elevation);
            }
        }

        _vapourPressure[i] = pressure;
    }

    /// <summary>A chest that this effect alone heats, with a gauge of its own, tells the pressure of the vapour.</summary>
    private double? HeatedChestPressure(int i, LineInputs inputs)
    {
        foreach (int heated in _routes.Heats[i])
        {
            if (_routes.Heating[heated].Length == 1 && inputs.At(_at.Effects[heated].ChestPressure) is var pressure && !double.IsNaN(pressure))
                return pressure + _at.Line.Effects[heated].Chest.LineLoss;
        }

        return null;
    }

    private void ChestSide(int i, LineInputs inputs, Span<EffectState> effects)
    {
        ref EffectState state = ref effects[i];
        EffectPlaces at = _at.Effects[i];
        (double pressure, HeatingTemperatureSource source) = ChestPressure(i, inputs);
        state.HeatingTemperature = Physical.SaturationTemperature(pressure);
        if (double.IsNaN(state.HeatingTemperature) && _at.Line.Effects[i].Chest.TemperatureSeesSaturation)
        {
            state.HeatingTemperature = inputs.At(at.ChestTemperature);
            pressure = Physical.SaturationPressure(state.HeatingTemperature);
            source = HeatingTemperatureSource.ChestThermometer;
        }

        state.HeatingFrom = double.IsNaN(state.HeatingTemperature) ? HeatingTemperatureSource.None : source;
        double condensate = Physical.CondensateEnthalpy(pressure, inputs.At(at.CondensateTemperature));
        double entering = HeatingEnthalpy(i, pressure, inputs, effects), loss = inputs.HeatLoss[i];
        double condensateFlow = CondensateFlow(i, state.HeatingTemperature, inputs);
        state.Duty[(int)DutySource.Condensate] = HeatBalance.ChestDuty(condensateFlow, entering, condensate, loss);
        bool ownsMain = _routes.SteamHeatsOnlyOne && !_routes.JoinedByFlash[i] && _routes.Heating[i] is [LineRoutes.Steam] && _at.SteamFlow >= 0
            && _at.All[_at.SteamFlow].Unit.Dimension == Dimension.MassFlow;
        double condensed = ownsMain ? inputs.At(_at.SteamFlow) * (1 - inputs.Vent[i]) : double.NaN;
        state.Duty[(int)DutySource.Steam] = HeatBalance.ChestDuty(condensed, entering, condensate, loss);
    }

    private (double Pressure, HeatingTemperatureSource Source) ChestPressure(int i, LineInputs inputs)
    {
        double own = inputs.At(_at.Effects[i].ChestPressure);
        if (!double.IsNaN(own)) return (own, HeatingTemperatureSource.ChestPressure);
        // Several sources join at the pressure of the lowest.
        double lowest = double.NaN;
        var source = HeatingTemperatureSource.None;
        foreach (int heater in _routes.Heating[i])
        {
            bool steam = heater == LineRoutes.Steam;
            double pressure = !steam ? heater < 0 ? double.NaN : _vapourPressure[heater] - _at.Line.Effects[i].Chest.LineLoss
                : _at.Line.Steam.PressureAt == SteamGaugePlace.Chest ? inputs.At(_at.SteamPressure) : double.NaN;
            if (pressure >= lowest || double.IsNaN(pressure)) continue;
            lowest = pressure;
            source = steam ? HeatingTemperatureSource.SteamPressure : HeatingTemperatureSource.HeatingVapourPressure;
        }

        return (lowest, source);
    }

    /// <summary>Enthalpy of what enters the chest, J/kg: vapour brings its superheat along. Several sources count evenly, for they differ by little.</summary>
    private double HeatingEnthalpy(int i, double pressure, LineInputs inputs, Span<EffectState> effects)
    {
        double sum = 0;
        foreach (int heater in _routes.Heating[i])
        {
            if (heater < LineRoutes.Steam)
            {
                // What a machine delivers differs too much from other sources to count evenly with them.
                sum += _routes.Heating[i].Length == 1 ? Delivered(LineRoutes.RecompressorOf(heater), pressure, inputs, effects) : double.NaN;
                continue;
            }

            if (heater != LineRoutes.Steam)
            {
                sum += Physical.VapourEnthalpy(double.IsNaN(_vapourPressure[heater]) ? pressure : _vapourPressure[heater], effects[heater].BoilingTemperature);
                continue;
            }

            // A valve keeps the enthalpy, so the main's own pressure and temperature serve wherever the gauge sits.
            double main = inputs.At(_at.SteamPressure), temperature = inputs.At(_at.SteamTemperature);
            double at = double.IsNaN(main) ? pressure : main;
            sum += double.IsNaN(temperature) ? Physical.VapourEnthalpy(at, Physical.SaturationTemperature(at)) : Physical.VapourEnthalpy(at, temperature);
        }

        return sum / _routes.Heating[i].Length;
    }

    private double CondensateFlow(int i, double temperature, LineInputs inputs)
    {
        int place = _at.Effects[i].CondensateFlow;
        return Physical.WaterMassFlow(inputs.At(place), place < 0 ? null : _at.All[place].Unit, temperature);
    }

    /// <summary>Enthalpy of what a recompressor delivers, J/kg: its flow is told by the condensate of the chests that it alone heats.</summary>
    private double Delivered(int r, double pressure, LineInputs inputs, Span<EffectState> effects)
    {
        int source = LineRoutes.RecompressorAt(r), suction = _routes.Suction[r];
        double delivered = 0;
        for (int j = 0; j < effects.Length; j++)
        {
            if (!_routes.Heating[j].Contains(source)) continue;
            bool alone = _routes.Heating[j].Length == 1 && !_routes.JoinedByFlash[j];
            delivered += alone ? CondensateFlow(j, Physical.SaturationTemperature(ChestPressure(j, inputs).Pressure), inputs) / (1 - inputs.Vent[j]) : double.NaN;
        }

        double drawn = Physical.VapourEnthalpy(_vapourPressure[suction], effects[suction].BoilingTemperature);
        return DirectRecompression.Enthalpy(_at.Line.Recompressors[r], _at.Recompressors[r], inputs, delivered, drawn, pressure, inputs.Efficiency[r]);
    }

    private double MassFlow(int place, LineInputs inputs, Liquor liquor, double solids, double temperature)
    {
        double flow = inputs.At(place);
        if (place < 0 || _at.All[place].Unit.Dimension == Dimension.MassFlow) return flow;
        return flow * Physical.LiquorDensity(liquor, solids, temperature);
    }
}
