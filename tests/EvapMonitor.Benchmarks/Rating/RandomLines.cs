using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Benchmarks.Rating;

/// <summary>Five-effect lines and conditions drawn at random within what a plant would take for sensible. The same seed gives the same lines.</summary>
public static class RandomLines
{
    /// <summary>The liquor of all of them: a sugar juice.</summary>
    public static LineProperties Properties { get; } = new(new Sucrose(0.9) { Name = "juice" });

    private static readonly string[] Names = ["A", "B", "C", "D", "E"];

    // Routes of the liquor: forward, backward, three mixed ones, parallel pairs.
    private static readonly int[][] Routes = [[0, 1, 2, 3, 4], [4, 3, 2, 1, 0], [2, 3, 4, 1, 0], [3, 4, 0, 1, 2], [1, 0, 2, 3, 4]];

    /// <summary>Draws one.</summary>
    public static (LineGraph Graph, RatingConditions Conditions) Next(Random random)
    {
        ArgumentNullException.ThrowIfNull(random);
        double Between(double low, double high) => low + ((high - low) * random.NextDouble());
        int[] route = Routes[random.Next(Routes.Length)];
        double area = Between(300, 2000);
        double coefficient = Between(1800, 3500);
        bool split = random.Next(4) == 0;
        var effects = new Effect[5];
        for (int step = 0; step < 5; step++)
        {
            int i = route[step];
            IReadOnlyList<LiquorSource> liquor = step == 0 ? [split ? new LiquorSource(null, new UncertainShare(Between(0.5, 0.8), 0)) : LiquorSource.Feed]
                : step == 1 && split ? [new LiquorSource(Names[route[0]]), new LiquorSource(null)]
                : [new LiquorSource(Names[route[step - 1]])];
            effects[i] = new Effect
            {
                Name = Names[i], Heating = [i == 0 ? HeatSource.Steam : new HeatSource(Names[i - 1])], Liquor = liquor, Area = area * Between(0.7, 1.3),
            };
        }

        double solids = Between(0.08, 0.18), hot = Between(112, 140), cold = Between(48, 65);
        // Liquor gets thicker along its route, and coefficients fall with that.
        Dictionary<string, double> coefficients = route.Select((i, step) => (Names[i], coefficient * (1 - (0.16 * step)) * Between(0.6, 1.1)))
            .ToDictionary(pair => pair.Item1, pair => pair.Item2);
        double perDegree = area * coefficient * 0.6 / 2.26e6;
        var line = new Line
        {
            Name = "random", Liquor = new LiquorChoice(Properties.Liquor, null, new Dictionary<int, Liquor>()), Effects = effects,
            Bleeds = [new("A", "heater", null), new("B", "pans", null)],
            CondensateFlashes = random.Next(2) == 0 ? [] : [new("B", "C"), new("C", "D")],
        };
        return (new LineGraph(line), new RatingConditions
        {
            Coefficients = coefficients, FeedSolids = solids, FeedTemperature = 273.15 + Between(40, 110), ProductSolids = Between(0.4, 0.66),
            LastVapourPressure = Core.Properties.Steam.SaturationPressure(273.15 + cold), SteamPressure = Core.Properties.Steam.SaturationPressure(273.15 + hot),
            Bleeds = new Dictionary<string, double> { ["A to heater"] = perDegree * Between(0, 1), ["B to pans"] = perDegree * Between(0, 1.5) },
        });
    }
}
