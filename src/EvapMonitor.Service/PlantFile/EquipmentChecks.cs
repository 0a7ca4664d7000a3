using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What only the line as a whole can tell of bodies and recompressors: that each is used, and that it can be told where.</summary>
internal static class EquipmentChecks
{
    public static void Check(
        IReadOnlyList<EffectEntry> entries, IReadOnlyList<Body> bodies, IReadOnlyList<Recompressor> machines, MappingReader line, Findings findings)
    {
        foreach (Body body in bodies)
        {
            PlantNode place = KeyOf(line, "bodies", body.Name);
            List<string> listed = [.. entries.Where(e => e.Effect.Bodies.Contains(body.Name)).Select(e => e.Effect.Name)];
            if (listed.Count == 0 && body.Serves.Count == 0) findings.Note(place, $"no effect has the body {body.Name}");
            if (listed.Count + body.Serves.Count < 2) continue;
            // A body that can be in more than one place needs a signal for each.
            foreach (string effect in listed.Where(effect => !body.Serves.ContainsKey(effect) && (listed.Count > 1 || body.Serves.Count > 0)))
                findings.Wrong(place, $"{body.Name}, which can serve several effects, without a signal for {effect}", $"serves: {{{effect}: {{signal: …, active: \">0.5\"}}}}");
        }

        foreach (Recompressor machine in machines)
        {
            PlantNode place = KeyOf(line, "recompressors", machine.Name);
            if (!entries.Any(e => e.Effect.Heating.Any(h => h.Recompressor == machine.Name)))
                findings.Wrong(place, $"the recompressor {machine.Name}, which heats no effect", $"heating: {machine.Name} in an effect");
        }
    }

    private static ScalarNode KeyOf(MappingReader line, string section, string name) =>
        ((MappingNode)line.Take(section)!).Entries.First(e => e.Key.Text == name).Key;
}
