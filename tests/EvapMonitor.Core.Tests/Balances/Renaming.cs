using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>The same line with every effect called something else and the effects written in the opposite order.</summary>
internal static class Renaming
{
    public static (TestLines.Case Case, Func<string, string> NewName) Of(TestLines.Case one)
    {
        Line line = one.Graph.Line;
        var names = line.Effects.Select((effect, i) => (effect.Name, New: $"Z{(i * 7) % 11}x{i}")).ToDictionary(pair => pair.Name, pair => pair.New);
        string New(string name) => names.GetValueOrDefault(name, name);
        string? Maybe(string? name) => name is null ? null : New(name);
        Line changed = line with
        {
            Effects = [.. line.Effects.Reverse().Select(effect => effect with
            {
                Name = New(effect.Name),
                Heating = [.. effect.Heating.Reverse().Select(source => source with { VapourOf = Maybe(source.VapourOf) })],
                Liquor = [.. effect.Liquor.Select(source => source with { From = Maybe(source.From) })],
            })],
            Bleeds = [.. line.Bleeds.Reverse().Select(bleed => bleed with { From = New(bleed.From) })],
            CondensateFlashes = [.. line.CondensateFlashes.Select(flash => new CondensateFlash(New(flash.From), New(flash.To)))],
            Tanks = [.. line.Tanks.Select(tank => tank with { From = Maybe(tank.From) })],
            Recompressors = [.. line.Recompressors.Select(machine => machine with { Suction = New(machine.Suction) })],
        };
        string NewWay(string way) => string.Join(" to ", way.Split(" to ").Select(New));
        RatingConditions conditions = one.Conditions with
        {
            Coefficients = one.Conditions.Coefficients.ToDictionary(pair => New(pair.Key), pair => pair.Value),
            Bleeds = one.Conditions.Bleeds.ToDictionary(pair => NewWay(pair.Key), pair => pair.Value),
        };
        return (new(one.Name + " renamed", new LineGraph(changed), conditions), New);
    }
}
