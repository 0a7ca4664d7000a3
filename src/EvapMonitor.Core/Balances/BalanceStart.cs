using EvapMonitor.Core.Plant;
using static EvapMonitor.Core.Balances.LineVariables;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// Where the reconciliation of a window begins: a plausible state of the line with what is measured put in. It need not be right, only near enough, and it depends
/// on the window's readings alone, so that the same readings always lead to the same result.
/// </summary>
internal sealed class BalanceStart(LineGraph graph, LineVariables variables, LineProperties properties)
{
    private const double FeedSolids = 0.14, ProductSolids = 0.55;
    private readonly int[] _depth = Depths(graph);

    /// <summary>
    /// Temperature of a last vapour and driving force of an effect without any instrument, K (common practice, without source): recompression works at less.
    /// </summary>
    private readonly (double Last, double Force) _usual = graph.Heating.Any(way => way.From == LineGraph.Steam && graph.BySteamAlone[way.To]) || graph.Line.Recompressors.Count == 0 ? (330, 9)
        : graph.Line.Recompressors.Any(machine => machine.Kind == RecompressorKind.Mechanical) ? (373, 6) : (318, 7);

    /// <summary>Fills a state.</summary>
    /// <param name="x">Receives a value for each variable.</param>
    /// <param name="typicalFlow">A typical feed, kg/s.</param>
    /// <param name="known">A value by variable where an instrument tells it directly; NaN elsewhere.</param>
    public void Fill(double[] x, double typicalFlow, double[] known)
    {
        double Known(int variable, double otherwise) => variable >= 0 && double.IsFinite(known[variable]) ? known[variable] : otherwise;
        Array.Clear(x);
        double feed = double.Max(Known(variables.FeedFlow, typicalFlow), 0.05 * typicalFlow);
        double solids = Known(variables.FeedSolids, FeedSolids), thick = double.Max(Known(variables.ProductSolids, ProductSolids), solids + 0.01);
        double product = Known(variables.ProductFlow, solids > 0 ? feed * solids / thick : 0.5 * feed);
        product = double.Clamp(product, 0.02 * feed, 0.98 * feed);
        (x[variables.FeedFlow], x[variables.FeedSolids], x[variables.FeedTemperature]) = (feed, solids, Known(variables.FeedTemperature, 350));
        (x[variables.ProductFlow], x[variables.ProductSolids], x[variables.Evaporation]) = (product, Known(variables.ProductSolids, solids * feed / product), feed - product);
        Liquor(x, feed, solids, (feed - product) / graph.Line.Effects.Count);
        Pressures(x, known);
        Vapour(x);
        Machines(x);
        for (int i = 0; i < known.Length; i++)
        {
            if (double.IsFinite(known[i])) x[i] = known[i];
        }

        for (int i = 0; i < variables.Effects.Length; i++)
        {
            EffectVariables at = variables.Effects[i];
            x[at.Heating] = Known(at.Heating, properties.SaturationTemperature(x[at.ChestPressure]).Value);
            double water = properties.SaturationTemperature(x[at.VapourPressure]).Value;
            x[at.Boiling] = Known(at.Boiling, water + properties.Elevation(x[at.Solids], water, 0, out _).Value);
        }
    }

    /// <summary>From steam to condenser by depth, each step a driving force and the elevation there, and through what is measured.</summary>
    private void Pressures(double[] x, double[] known)
    {
        double Saturation(int variable) => variable >= 0 && known[variable] > 700 ? properties.SaturationTemperature(known[variable]).Value : double.NaN;
        int deepest = _depth.Max();
        double[] elevation = new double[deepest + 1];
        (double top, double last) = (Saturation(variables.SteamPressure), double.NaN);
        for (int i = 0; i < _depth.Length; i++)
        {
            EffectVariables at = variables.Effects[i];
            elevation[_depth[i]] = double.Max(elevation[_depth[i]], properties.Elevation(x[at.Solids], 350, 0, out _).Value);
            if (_depth[i] == deepest && Saturation(at.VapourPressure) is var lowest && !double.IsNaN(lowest)) last = lowest;
            if (_depth[i] == 1 && Saturation(at.ChestPressure) is var highest && !double.IsNaN(highest)) top = highest;
        }

        double lost = elevation.Sum();
        if (double.IsNaN(last)) last = double.IsNaN(top) ? _usual.Last : double.Max(300, top - lost - (deepest * _usual.Force));
        if (double.IsNaN(top)) top = last + lost + (deepest * _usual.Force);
        double force = double.Max(2, (top - last - lost) / deepest);
        double[] vapour = new double[deepest + 1];
        vapour[0] = top;
        for (int d = 1; d <= deepest; d++) vapour[d] = vapour[d - 1] - force - elevation[d];
        if (variables.SteamPressure >= 0) x[variables.SteamPressure] = Pressure(top);
        for (int i = 0; i < _depth.Length; i++)
        {
            EffectVariables at = variables.Effects[i];
            x[at.VapourPressure] = known[at.VapourPressure] > 700 ? known[at.VapourPressure] : Pressure(vapour[_depth[i]]);
            x[at.ChestPressure] = Pressure(vapour[_depth[i] - 1]);
        }

        // A chest has the pressure of the vapour that heats it.
        foreach (HeatingWay way in graph.Heating)
        {
            int chest = variables.Effects[way.To].ChestPressure;
            if (known[chest] > 700) x[chest] = known[chest];
            else if (way.From >= 0) x[chest] = double.Max(700, x[variables.Effects[way.From].VapourPressure] - graph.Line.Effects[way.To].Chest.LineLoss);
        }
    }

    private double Pressure(double temperature) => Properties.Steam.SaturationPressure(double.Clamp(temperature, 285, 500));

    /// <summary>Liquor passes on what is not evaporated; some rounds serve any route.</summary>
    private void Liquor(double[] x, double feed, double solids, double evaporation)
    {
        int nodes = graph.FirstTank + variables.Tanks.Length;
        double[] flow = new double[nodes], dry = new double[nodes];
        for (int round = 0; round <= nodes; round++)
        {
            for (int node = 0; node < nodes; node++)
            {
                (double entering, double carried) = (0, 0);
                for (int k = 0; k < graph.Liquor.Count; k++)
                {
                    LiquorWay way = graph.Liquor[k];
                    if (way.To != node) continue;
                    double share = ShareOf(way);
                    entering += share * (way.From == LineGraph.Feed ? feed : flow[way.From]);
                    carried += share * (way.From == LineGraph.Feed ? feed * solids : dry[way.From]);
                }

                flow[node] = node < graph.FirstTank ? double.Max(0.1 * entering, entering - evaporation) : entering;
                dry[node] = carried;
            }
        }

        for (int k = 0; k < graph.Liquor.Count; k++)
        {
            LiquorWay way = graph.Liquor[k];
            double share = ShareOf(way);
            x[variables.Liquor[k].Flow] = share * (way.From == LineGraph.Feed ? feed : flow[way.From]);
            if (variables.Liquor[k].Share >= 0) x[variables.Liquor[k].Share] = share;
        }

        for (int i = 0; i < variables.Effects.Length; i++)
        {
            x[variables.Effects[i].Flow] = flow[i];
            x[variables.Effects[i].Solids] = flow[i] > 0 ? double.Min(0.9, dry[i] / flow[i]) : solids;
            x[variables.Effects[i].Vapour] = evaporation;
        }

        for (int t = 0; t < variables.Tanks.Length; t++) x[variables.Tanks[t].Flow] = flow[graph.FirstTank + t];
    }

    /// <summary>The share of its source that a way takes: as stated, or what the others leave.</summary>
    private double ShareOf(LiquorWay way)
    {
        if (way.Share is { } share) return share.Value;
        double stated = 0;
        int others = 0;
        foreach (LiquorWay other in graph.Liquor)
        {
            if (other.From != way.From) continue;
            if (other.Share is { } taken) stated += taken.Value;
            else others++;
        }

        return (1 - stated) / others;
    }

    private void Vapour(double[] x)
    {
        for (int i = 0; i < variables.Effects.Length; i++)
        {
            EffectVariables at = variables.Effects[i];
            double vapour = x[at.Vapour];
            x[at.Duty] = vapour * LatentHeat;
            x[at.Condensate] = vapour;
            if (at.ToCondenser >= 0) x[at.ToCondenser] = vapour;
            if (at.Flashing >= 0) (x[at.Flashing], x[at.FlashVapour]) = (vapour, 0.02 * vapour);
            x[at.HeatLoss] = graph.Line.Effects[i].HeatLoss.Value;
            x[at.Vent] = graph.Line.Effects[i].Vent.Value;
        }

        for (int k = 0; k < graph.Heating.Count; k++)
        {
            int chest = graph.Heating[k].To;
            int sources = 0;
            foreach (HeatingWay way in graph.Heating) sources += way.To == chest ? 1 : 0;
            x[variables.Heating[k]] = x[variables.Effects[chest].Condensate] / sources;
            if (graph.Heating[k].From == LineGraph.Steam) x[variables.SteamFlow] += x[variables.Heating[k]];
        }

        for (int b = 0; b < variables.Bleeds.Length; b++)
        {
            x[variables.Bleeds[b]] = 0.1 * x[variables.Effects[graph.BleedFrom[b]].Vapour];
            if (graph.BleedTo[b] >= 0) x[variables.Heaters[graph.BleedTo[b]].Duty] += LatentHeat * x[variables.Bleeds[b]];
        }

        foreach (HeaterVariables heater in variables.Heaters)
        {
            (x[heater.In], x[heater.Out], x[heater.Solids]) = (330, 345, x[variables.FeedSolids]);
            x[heater.Flow] = x[heater.Duty] / (4000 * 15);
        }
    }

    private void Machines(double[] x)
    {
        for (int r = 0; r < variables.Recompressors.Length; r++)
        {
            RecompressorVariables at = variables.Recompressors[r];
            Recompressor machine = graph.Line.Recompressors[r];
            double delivered = 0, pressure = 1e5;
            for (int k = 0; k < graph.Heating.Count; k++)
            {
                if (graph.Heating[k].Recompressor != r) continue;
                delivered += x[variables.Heating[k]];
                pressure = x[variables.Effects[graph.Heating[k].To].ChestPressure];
            }

            (x[at.Discharge], x[at.Pressure], x[at.Enthalpy]) = (delivered, pressure, properties.SaturatedVapour(pressure).Value + 3e4);
            if (machine.Kind == RecompressorKind.Thermal) (x[at.Motive], x[at.MotiveEnthalpy], x[at.Suction]) = (0.5 * delivered, 2.78e6, 0.5 * delivered);
            else (x[at.Power], x[at.Efficiency], x[at.Suction]) = (6e4 * delivered, machine.Efficiency.Value, delivered);
        }
    }

    /// <summary>How many surfaces the heat has passed behind an effect; what a recompressor delivers counts as steam.</summary>
    private static int[] Depths(LineGraph graph)
    {
        int[] depth = new int[graph.Line.Effects.Count];
        for (int round = 0; round < depth.Length + 1; round++)
        {
            for (int i = 0; i < depth.Length; i++)
            {
                int before = 0;
                foreach (HeatingWay way in graph.Heating)
                {
                    if (way.To == i && way.From >= 0) before = int.Max(before, depth[way.From]);
                }

                depth[i] = int.Min(before + 1, depth.Length);
            }
        }

        return depth;
    }
}
