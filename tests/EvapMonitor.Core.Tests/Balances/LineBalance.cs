using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>
/// What enters a line less what leaves it, over its outer border and with the steam tables asked anew: independent of the equations inside.
/// </summary>
internal sealed record LineBalance(double Mass, double Solids, double Energy, double EnergyIn)
{
    public static LineBalance Of(LineGraph graph, LineProperties properties, OperatingPoint point)
    {
        Liquor liquor = properties.Liquor;
        double At(VariableKind kind, string place = "") => point[kind, place];
        double mass = At(VariableKind.FeedFlow), solids = mass * At(VariableKind.FeedSolids);
        double energyIn = mass * liquor.Enthalpy(At(VariableKind.FeedSolids), At(VariableKind.FeedTemperature)), energyOut = 0;
        void In(double flow, double enthalpy) => (mass, energyIn) = (mass + flow, energyIn + (flow * enthalpy));
        void Out(double flow, double enthalpy) => (mass, energyOut) = (mass - flow, energyOut + (flow * enthalpy));
        double VapourOf(string effect) => Steam.VapourEnthalpy(At(VariableKind.VapourPressure, effect), At(VariableKind.BoilingTemperature, effect));

        if (graph.HasSteam) In(At(VariableKind.SteamFlow), Steam.SaturatedVapourEnthalpy(At(VariableKind.SteamPressure)));
        foreach (Recompressor machine in graph.Line.Recompressors)
        {
            if (machine.Kind == RecompressorKind.Thermal) In(At(VariableKind.MotiveFlow, machine.Name), At(VariableKind.MotiveEnthalpy, machine.Name));
            else
            {
                energyIn += At(VariableKind.Efficiency, machine.Name) * At(VariableKind.Power, machine.Name);
                In(At(VariableKind.SprayFlow, machine.Name), Steam.SaturatedLiquidEnthalpy(At(VariableKind.DischargePressure, machine.Name)));
            }
        }

        foreach (LiquorWay way in graph.Liquor.Where(way => way.To == LineGraph.Product))
        {
            string from = graph.NameOf(way.From);
            double flow = At(VariableKind.LiquorFlow, VariableKey.Way(from, "product"));
            Out(flow, liquor.Enthalpy(At(VariableKind.LeavingSolids, from), At(VariableKind.BoilingTemperature, from)));
            solids -= flow * At(VariableKind.LeavingSolids, from);
        }

        foreach (Bleed bleed in graph.Line.Bleeds) Out(At(VariableKind.BleedFlow, VariableKey.Way(bleed.From, bleed.To)), VapourOf(bleed.From));
        for (int i = 0; i < graph.Line.Effects.Count; i++)
        {
            Effect effect = graph.Line.Effects[i];
            if (graph.ToCondenser[i]) Out(At(VariableKind.CondenserFlow, effect.Name), VapourOf(effect.Name));
            double chest = At(VariableKind.ChestPressure, effect.Name), condensate = At(VariableKind.CondensateFlow, effect.Name);
            double vent = At(VariableKind.VentShare, effect.Name), loss = At(VariableKind.HeatLossShare, effect.Name);
            // What condensed is 1 − vent of what entered; the vent carries the enthalpy at which it entered, the loss is a share of the heat given up.
            double heat = At(VariableKind.Duty, effect.Name) / (1 - loss), liquid = Steam.SaturatedLiquidEnthalpy(chest);
            energyOut += heat * loss;
            Out(condensate * vent / (1 - vent), (heat / condensate) + liquid);
            double liquidLeft = condensate;
            foreach (CondensateFlash flash in graph.Line.CondensateFlashes.Where(flash => flash.To == effect.Name))
                liquidLeft += At(VariableKind.FlashingFlow, flash.From) - At(VariableKind.FlashVapour, flash.From);
            if (graph.FlashTo[i] < 0) Out(liquidLeft, liquid);
        }

        return new(mass, solids, energyIn - energyOut, energyIn);
    }
}
