using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Outlook;

/// <summary>What a rating holds fixed: a value for each given variable, and what is missing or makes no sense, in words for people.</summary>
internal sealed class RatingGivens
{
    private readonly LineGraph _graph;
    private readonly LineVariables _at;
    private readonly RatingConditions _conditions;

    private readonly bool _withMakeUp;

    /// <summary>Gathers the givens.</summary>
    /// <param name="graph">The line.</param>
    /// <param name="variables">Its variables.</param>
    /// <param name="conditions">What is given.</param>
    /// <param name="withMakeUp">
    /// True: where steam helps a compressor and no flow is given for it, it is what the compressor leaves short, and no vapour is in surplus. False: none flows.
    /// </param>
    public RatingGivens(LineGraph graph, LineVariables variables, RatingConditions conditions, bool withMakeUp)
    {
        (_graph, _at, _conditions, _withMakeUp) = (graph, variables, conditions, withMakeUp);
        Problem = Sense() ?? Missing();
        if (Problem is not null) return;
        Liquor();
        Effects();
        Ways();
        Machines();
        Problem = Adjustable();
    }

    /// <summary>True when make-up steam is to be found.</summary>
    public bool HasMakeUp { get; private set; }

    /// <summary>Why nothing can be rated; null when all is there.</summary>
    public string? Problem { get; }

    /// <summary>The given variables.</summary>
    public Dictionary<int, double> Values { get; } = [];

    /// <summary>Solids of the feed over those of the product and so on, where two of them fix the third; NaN when not given.</summary>
    public double FeedFlow => FlowFromOthers(_conditions.FeedFlow, _conditions.Evaporation / (1 - (_conditions.FeedSolids / _conditions.ProductSolids)));

    /// <summary>Evaporation, kg/s, where the givens fix it; else NaN.</summary>
    public double Evaporation => FlowFromOthers(_conditions.Evaporation, _conditions.FeedFlow * (1 - (_conditions.FeedSolids / _conditions.ProductSolids)));

    private static double FlowFromOthers(double? given, double? found) => given ?? found ?? double.NaN;

    private string? Sense()
    {
        RatingConditions c = _conditions;
        if (c.FeedSolids is not (>= 0 and < 1)) return Invariant($"no rating: feed solids of {100 * c.FeedSolids:0.##} % are not from 0 to under 100 %");
        if (c.ProductSolids is { } product && !(product > c.FeedSolids && product < 1))
            return Invariant($"no rating: product solids of {100 * product:0.##} % are not above those of the feed ({100 * c.FeedSolids:0.##} %) and under 100 %");
        if (c.FeedTemperature is not (>= 273.15 and <= 473.15)) return Invariant($"no rating: a feed of {c.FeedTemperature - 273.15:0.#} °C is not from 0 to 200 °C");
        if (!IsPressure(c.LastVapourPressure)) return Invariant($"no rating: a last vapour pressure of {c.LastVapourPressure / 1000:0.###} kPa is not from 0.7 to 1500 kPa");
        if (c.SteamPressure is { } steam && !IsPressure(steam)) return Invariant($"no rating: a steam pressure of {steam / 1000:0.###} kPa is not from 0.7 to 1500 kPa");
        if (c.FeedFlow is { } flow && !IsFlow(flow)) return "no rating: the feed flow is not above 0";
        if (c.Evaporation is { } evaporation && !IsFlow(evaporation)) return "no rating: the evaporation asked for is not above 0";
        if (c.SteamSuperheat is not (>= 0 and < 300)) return "no rating: the superheat of the steam is not from 0 to under 300 K";
        foreach ((string way, double bleed) in c.Bleeds.Concat(c.MakeUpSteam))
        {
            if (!(bleed >= 0) || !double.IsFinite(bleed)) return $"no rating: the vapour or steam on the way {way} is not 0 or more";
        }

        foreach ((string name, HeaterConditions h) in c.Heaters)
        {
            if (!(h.Flow >= 0) || !double.IsFinite(h.Flow) || h.Solids is not (>= 0 and < 1) || h.In is not (>= 273.15 and <= 473.15) || h.Out is not (>= 273.15 and <= 473.15))
                return $"no rating: heater {name} has a flow under 0, solids not from 0 to under 100 %, or a temperature not from 0 to 200 °C";
        }

        foreach ((string name, MotiveConditions m) in c.Motive)
        {
            if (m.Pressure is not (>= 700 and <= 1.6e7) || m.Superheat is not (>= 0 and < 300) || (m.Flow is { } motive && !IsFlow(motive)))
                return $"no rating: the motive steam of {name} has a pressure not from 0.7 kPa to 16 MPa, a superheat not from 0 to under 300 K, or a flow not above 0";
        }

        if (c.FeedFlow is { } feed && c.Evaporation >= feed) return "no rating: more evaporation is asked for than there is feed";
        return null;
    }

    private string? Missing()
    {
        for (int i = 0; i < _graph.Line.Effects.Count; i++)
        {
            string effect = _graph.Line.Effects[i].Name;
            if (_graph.Bodies[i].Count == 0) return $"no rating: no body is in service in {effect}";
            foreach (BodyInService body in _graph.Bodies[i])
            {
                if (!_conditions.Coefficients.TryGetValue(body.Name, out double u)) return $"no rating: the coefficient of {body.Name} is missing";
                if (!(u > 0) || !double.IsFinite(u)) return $"no rating: the coefficient of {body.Name} is not above 0";
            }
        }

        foreach (Recompressor machine in _graph.Line.Recompressors)
        {
            if (machine.Curve is null) return $"no rating: the curve of {machine.Name} is missing";
            if (machine.Kind == RecompressorKind.Thermal && !_conditions.Motive.ContainsKey(machine.Name)) return $"no rating: the motive steam of {machine.Name} is missing";
        }

        foreach (Heater heater in _graph.Line.Heaters)
        {
            if (!_conditions.Heaters.ContainsKey(heater.Name)) return $"no rating: flow and temperatures of heater {heater.Name} are missing";
        }

        return null;
    }

    private void Liquor()
    {
        Set(VariableKind.FeedSolids, "", _conditions.FeedSolids);
        Set(VariableKind.FeedTemperature, "", _conditions.FeedTemperature);
        Set(VariableKind.ElevationError, "", 0);
        Set(VariableKind.SteamSuperheat, "", _conditions.SteamSuperheat);
        for (int k = 0; k < _graph.Liquor.Count; k++)
        {
            if (_graph.Liquor[k].Share is { } share) Values[_at.Liquor[k].Share] = share.Value;
        }

        foreach (Tank tank in _graph.Line.Tanks) Set(VariableKind.Accumulation, tank.Name, 0);
    }

    private void Effects()
    {
        for (int i = 0; i < _graph.Line.Effects.Count; i++)
        {
            Effect effect = _graph.Line.Effects[i];
            Set(VariableKind.HeatLossShare, effect.Name, effect.HeatLoss.Value);
            Set(VariableKind.VentShare, effect.Name, effect.Vent.Value);
            Set(VariableKind.Subcooling, effect.Name, 0);
            Set(VariableKind.Accumulation, effect.Name, 0);
            if (_graph.ToCondenser[i]) Set(VariableKind.VapourPressure, effect.Name, _conditions.LastVapourPressure);
            if (_at.Bodies[i].Length == 0) Set(VariableKind.Coefficient, effect.Name, _conditions.Coefficients[effect.Name]);
            else foreach (BodyInService body in _graph.Bodies[i]) Set(VariableKind.BodyCoefficient, body.Name, _conditions.Coefficients[body.Name]);
        }
    }

    private void Ways()
    {
        for (int k = 0; k < _graph.Heating.Count; k++)
        {
            HeatingWay way = _graph.Heating[k];
            if (way.From != LineGraph.Steam || _graph.BySteamAlone[way.To]) continue;
            if (_withMakeUp && !_conditions.MakeUpSteam.ContainsKey(_graph.NameOf(way.To)) && SurplusOf(way.To) is >= 0 and var surplus && Values.TryAdd(surplus, 0)) HasMakeUp = true;
            else Values[_at.Heating[k]] = _conditions.MakeUpSteam.GetValueOrDefault(_graph.NameOf(way.To));
        }

        var followed = new HashSet<int>();
        for (int b = 0; b < _at.Bleeds.Length; b++)
        {
            // The first bleed to a heater follows from its duty; further ones are given.
            if (_graph.BleedTo[b] >= 0 && followed.Add(_graph.BleedTo[b])) continue;
            Values[_at.Bleeds[b]] = _conditions.Bleeds.GetValueOrDefault(_at.Keys[_at.Bleeds[b]].Place);
        }

        foreach (Heater heater in _graph.Line.Heaters)
        {
            HeaterConditions at = _conditions.Heaters[heater.Name];
            Set(VariableKind.HeaterFlow, heater.Name, at.Flow);
            Set(VariableKind.HeaterSolids, heater.Name, at.Solids);
            Set(VariableKind.HeaterIn, heater.Name, at.In);
            Set(VariableKind.HeaterOut, heater.Name, at.Out);
        }
    }

    /// <summary>The vapour that a compressor leaves to the condenser and that heats the chest otherwise; −1 when there is none.</summary>
    private int SurplusOf(int chest)
    {
        HeatingWay? way = _graph.Heating.FirstOrDefault(way => way.To == chest && way.Recompressor >= 0
            && _graph.Line.Recompressors[way.Recompressor].Kind == RecompressorKind.Mechanical);
        return way is null ? -1 : _at.Effects[_graph.SuctionFrom[way.Recompressor]].ToCondenser;
    }

    private void Machines()
    {
        foreach (Recompressor machine in _graph.Line.Recompressors)
        {
            if (machine.Kind == RecompressorKind.Mechanical)
            {
                Set(VariableKind.Efficiency, machine.Name, machine.Efficiency.Value);
                continue;
            }

            MotiveConditions motive = _conditions.Motive[machine.Name];
            Set(VariableKind.MotiveEnthalpy, machine.Name, Steam.VapourEnthalpy(motive.Pressure, Steam.SaturationTemperature(motive.Pressure) + motive.Superheat));
        }
    }

    /// <summary>As many givens among feed, product, evaporation and steam as the line can take.</summary>
    private string? Adjustable()
    {
        var given = new List<string>();
        var could = new List<string> { "feed flow", "product solids", "evaporation" };
        void Offer(VariableKind kind, string place, double? value, string words)
        {
            if (value is not { } number) return;
            Set(kind, place, number);
            given.Add(words);
        }

        Offer(VariableKind.FeedFlow, "", _conditions.FeedFlow, could[0]);
        Offer(VariableKind.ProductSolids, "", _conditions.ProductSolids, could[1]);
        Offer(VariableKind.Evaporation, "", _conditions.Evaporation, could[2]);
        int wanted = 1;
        if (_graph.BySteamAlone.Contains(true))
        {
            wanted++;
            could.Add("steam pressure");
            Offer(VariableKind.SteamPressure, "", _conditions.SteamPressure, could[^1]);
        }
        else if (_graph.HasSteam)
        {
            if (_conditions.SteamPressure is not { } supply) return "no rating: the pressure of the make-up steam is missing";
            Set(VariableKind.SteamPressure, "", supply);
        }

        foreach (Recompressor machine in _graph.Line.Recompressors.Where(machine => machine.Kind == RecompressorKind.Thermal))
        {
            wanted++;
            could.Add("motive steam of " + machine.Name);
            Offer(VariableKind.MotiveFlow, machine.Name, _conditions.Motive[machine.Name].Flow, could[^1]);
        }

        if (given.Count == wanted && given.Exists(words => could.IndexOf(words) < 3)) return null;
        return $"no rating: {wanted} of {string.Join(", ", could)} are to be given, one of the first three among them; given: {(given.Count == 0 ? "none" : string.Join(", ", given))}";
    }

    private void Set(VariableKind kind, string place, double value)
    {
        if (_at[kind, place] is >= 0 and var i) Values[i] = value;
    }

    private static bool IsFlow(double flow) => flow > 0 && double.IsFinite(flow);

    private static bool IsPressure(double pressure) => pressure is >= 700 and <= 1.5e6;

    private static string Invariant(FormattableString text) => FormattableString.Invariant(text);
}
