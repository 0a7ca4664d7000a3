using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What <c>evapmonitor check</c> says of bodies, tanks, flash, heaters and recompressors, and whether the line can be rated.</summary>
internal static class EquipmentCheck
{
    /// <summary>The report, line by line; nothing for a line that has none of all this.</summary>
    public static IEnumerable<string> Report(Line line)
    {
        foreach (Body body in line.Bodies.Where(b => b.Serves.Count > 0))
            yield return Invariant($"  {body.Name}: {body.Area:0.##} m2, serves {string.Join(", ", body.Serves.Select(s => $"{s.Key} when {s.Value.Instrument.Signal} says so"))}");
        foreach (Tank tank in line.Tanks)
            yield return $"  {tank.Name}: tank behind {tank.From ?? "the feed"}; what leaves it is not told by what enters it";
        foreach (CondensateFlash flash in line.CondensateFlashes)
            yield return $"  condensate of {flash.From} flashes into the chest of {flash.To}" + (line.CondensateFlashes.Any(f => f.From == flash.To) ? ", and what is left goes on with its condensate" : "");
        foreach (Heater heater in line.Heaters) yield return "  " + Of(line, heater);
        foreach (Recompressor machine in line.Recompressors)
            yield return $"  {machine.Name}: {(machine.Kind == RecompressorKind.Thermal ? "thermal" : "mechanical")} recompressor on vapour of {machine.Suction}; {(machine.Curve is null ? "no curve: the line cannot be rated" : "curve given")}";
    }

    private static string Of(Line line, Heater heater)
    {
        List<string> missing = [];
        if (heater.Flow is null) missing.Add("its flow");
        if (heater.In is null) missing.Add("the temperature before it");
        if (heater.Out is null) missing.Add("the temperature behind it");
        string from = string.Join(" and ", line.Bleeds.Where(b => b.To == heater.Name).Select(b => b.From));
        string bleed = from.Length == 0 ? "no bleed" : "bleed of " + from;
        return missing.Count == 0
            ? $"{heater.Name}: {bleed} follows from its duty: {heater.Flow!.Signal}, {heater.In!.Signal}, {heater.Out!.Signal}"
            : $"{heater.Name}: {bleed}; for its duty missing: {string.Join(" and ", missing)}";
    }
}
