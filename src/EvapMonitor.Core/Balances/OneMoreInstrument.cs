using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>An instrument that a line does not have.</summary>
/// <param name="Name">What it would measure, in words.</param>
/// <param name="On">The line with it.</param>
internal sealed record OneMoreInstrument(string Name, Func<Line, Line> On)
{
    private static readonly UnitOfMeasure Flow = new("kg/s", Dimension.MassFlow, 1), Solids = new("kg/kg", Dimension.Fraction, 1), Kelvin = new("K", Dimension.Temperature, 1),
        Pascal = new("Pa", Dimension.Pressure, 1), Watt = new("W", Dimension.Power, 1);

    /// <summary>All that could be added to a line, one by one.</summary>
    /// <param name="line">The line.</param>
    /// <param name="usual">Accuracy by unit.</param>
    public static IReadOnlyList<OneMoreInstrument> For(Line line, Func<UnitOfMeasure, Accuracy> usual)
    {
        var all = new List<OneMoreInstrument>();
        void Add(Instrument? there, string name, UnitOfMeasure unit, Func<Line, Instrument, Line> put)
        {
            if (there is not null) return;
            var instrument = new Instrument { Signal = "+" + name, Unit = unit, Accuracy = usual(unit) };
            all.Add(new(name, to => put(to, instrument)));
        }

        Add(line.Feed.Flow, "a flow of the feed", Flow, (to, one) => to with { Feed = to.Feed with { Flow = one } });
        Add(line.Feed.Solids ?? line.Feed.Laboratory, "solids of the feed", Solids, (to, one) => to with { Feed = to.Feed with { Solids = one } });
        Add(line.Feed.Temperature, "a temperature of the feed", Kelvin, (to, one) => to with { Feed = to.Feed with { Temperature = one } });
        Add(line.Product.Flow, "a flow of the product", Flow, (to, one) => to with { Product = to.Product with { Flow = one } });
        Add(line.Product.Solids ?? line.Product.Laboratory, "solids of the product", Solids, (to, one) => to with { Product = to.Product with { Solids = one } });
        if (new LineGraph(line).HasSteam)
        {
            Add(line.Steam.Flow, "a flow of the steam", Flow, (to, one) => to with { Steam = to.Steam with { Flow = one } });
            Add(line.Steam.Pressure, "a steam pressure at the chest", Pascal, (to, one) => to with { Steam = to.Steam with { Pressure = one, PressureAt = SteamGaugePlace.Chest } });
        }

        for (int i = 0; i < line.Effects.Count; i++)
        {
            int at = i;
            Effect effect = line.Effects[i];
            void OnEffect(Instrument? there, string name, UnitOfMeasure unit, Func<Effect, Instrument, Effect> put) =>
                Add(there, $"{name} {effect.Name}", unit, (to, one) => to with { Effects = [.. to.Effects.Select((each, k) => k == at ? put(each, one) : each)] });

            OnEffect(effect.Chest.Pressure, "a chest pressure of", Pascal, (to, one) => to with { Chest = to.Chest with { Pressure = one } });
            OnEffect(effect.Chest.CondensateFlow, "a flow of condensate of", Flow, (to, one) => to with { Chest = to.Chest with { CondensateFlow = one } });
            OnEffect(effect.Vapour.Pressure, "a vapour pressure of", Pascal, (to, one) => to with { Vapour = to.Vapour with { Pressure = one } });
            OnEffect(effect.Leaving.Flow, "a flow of the liquor leaving", Flow, (to, one) => to with { Leaving = to.Leaving with { Flow = one } });
            OnEffect(effect.Leaving.Solids, "solids leaving", Solids, (to, one) => to with { Leaving = to.Leaving with { Solids = one } });
            OnEffect(
                effect.Leaving.TemperatureSeesFlashedLiquor ? effect.Leaving.Temperature : null, "a thermometer in flashed liquor of", Kelvin,
                (to, one) => to with { Leaving = to.Leaving with { Temperature = one, TemperatureSeesFlashedLiquor = true } });
        }

        for (int b = 0; b < line.Bleeds.Count; b++)
        {
            int at = b;
            Add(line.Bleeds[b].Flow, $"a flow of the bleed from {line.Bleeds[b].From} to {line.Bleeds[b].To}", Flow,
                (to, one) => to with { Bleeds = [.. to.Bleeds.Select((each, k) => k == at ? each with { Flow = one } : each)] });
        }

        for (int r = 0; r < line.Recompressors.Count; r++)
        {
            int at = r;
            Recompressor machine = line.Recompressors[r];
            void OnMachine(Instrument? there, string name, UnitOfMeasure unit, Func<Recompressor, Instrument, Recompressor> put) =>
                Add(there, $"{name} {machine.Name}", unit, (to, one) => to with { Recompressors = [.. to.Recompressors.Select((each, k) => k == at ? put(each, one) : each)] });

            if (machine.Kind == RecompressorKind.Mechanical) OnMachine(machine.Power, "the power of", Watt, (to, one) => to with { Power = one });
            else
            {
                OnMachine(machine.Motive.Flow, "a flow of the motive steam of", Flow, (to, one) => to with { Motive = to.Motive with { Flow = one } });
                OnMachine(machine.Motive.Pressure, "a pressure of the motive steam of", Pascal, (to, one) => to with { Motive = to.Motive with { Pressure = one } });
            }
        }

        return all;
    }
}
