using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>Invented lines that between them have everything a line can have.</summary>
internal static class TestLines
{
    public static UncertainShare None { get; } = new(0, 0);

    public static Instrument Meter(string signal) => new()
    {
        Signal = signal, Unit = new UnitOfMeasure("kg/s", Dimension.MassFlow, 1), Accuracy = new Accuracy(0, 1, AccuracyMeaning.HalfWidth),
    };

    public static HeatSource Vapour(string of) => new(of);

    public static HeatSource By(string machine) => new(null, machine);

    public static LiquorSource From(string? source, double? share = null) => new(source, share is { } value ? new UncertainShare(value, 0.01) : null);

    public static Effect Effect(string name, HeatSource heating, LiquorSource liquor, double area) => Effect(name, [heating], [liquor], area);

    public static Effect Effect(string name, IReadOnlyList<HeatSource> heating, IReadOnlyList<LiquorSource> liquor, double area) =>
        new() { Name = name, Heating = heating, Liquor = liquor, Area = area };

    public static Line Of(params Effect[] effects) => new()
    {
        Name = "test", Liquor = new LiquorChoice(new Sucrose(0.9) { Name = "juice" }, null, new Dictionary<int, Liquor>()), Effects = effects,
    };

    public static LineProperties Juice() => new(new Sucrose(0.9) { Name = "juice" });

    public static IReadOnlyDictionary<string, double> ByName(params (string, double)[] all) => all.ToDictionary(one => one.Item1, one => one.Item2);

    public sealed record Case(string Name, LineGraph Graph, RatingConditions Conditions)
    {
        public Rating Rating() => new(Graph, Juice());

        public OperatingPoint Solved()
        {
            RatingResult result = Rating().Solve(Conditions);
            return result.Point ?? throw new InvalidOperationException($"{Name}: {result.Reason}");
        }
    }

    public static IReadOnlyList<Case> All { get; } =
    [
        ForwardWithBleedsAndFlash(), Backward(), ParallelFeed(), MixedSevenWithBodies(), SharesTankAndTwoOnSteam(), ThermalWithFinisher(), MechanicalAlone(), MechanicalSprayed(),
        FiveWithCascade(), FiveMixed(),
    ];

    public static Case Named(string name) => All.First(one => one.Name == name);

    private static RatingConditions At(double last, double steam, double product, params (string, double)[] coefficients) => new()
    {
        Coefficients = ByName(coefficients), FeedSolids = 0.14, FeedTemperature = 365, ProductSolids = product, LastVapourPressure = last, SteamPressure = steam,
    };

    private static Case ForwardWithBleedsAndFlash()
    {
        Line line = Of(
            Effect("N1", HeatSource.Steam, LiquorSource.Feed, 1450), Effect("N2", Vapour("N1"), From("N1"), 1300),
            Effect("N3", Vapour("N2"), From("N2"), 1300), Effect("N4", Vapour("N3"), From("N3"), 1350)) with
        {
            Bleeds = [new("N1", "H1", null), new("N2", "pans", null)],
            Heaters = [new Heater { Name = "H1", Liquor = new Water { Name = "water" } }],
            CondensateFlashes = [new("N2", "N3")],
        };
        return new("forward", new(line), At(2e4, 1.6e5, 0.6, ("N1", 2900), ("N2", 2450), ("N3", 1850), ("N4", 980)) with
        {
            Bleeds = new Dictionary<string, double> { ["N2 to pans"] = 1.5 },
            Heaters = new Dictionary<string, HeaterConditions> { ["H1"] = new(40, 0, 330, 350) },
        });
    }

    private static Case Backward() => new("backward", new(Of(
            Effect("E1", HeatSource.Steam, From("E2"), 400), Effect("E2", Vapour("E1"), From("E3"), 400), Effect("E3", Vapour("E2"), LiquorSource.Feed, 400))),
        At(1.5e4, 2.5e5, 0.55, ("E1", 1800), ("E2", 2000), ("E3", 1900)) with { FeedTemperature = 310 });

    private static Case ParallelFeed() => new("parallel", new(Of(
            Effect("A", HeatSource.Steam, From(null, 0.35), 200), Effect("B", Vapour("A"), From(null, 0.35), 200), Effect("C", Vapour("B"), From(null), 220))),
        At(1.5e4, 2e5, 0.25, ("A", 2500), ("B", 2200), ("C", 1800)) with { FeedTemperature = 330 });

    private static Case MixedSevenWithBodies()
    {
        Line line = Of(
            Effect("E1", HeatSource.Steam, From("E4"), 600), Effect("E2", Vapour("E1"), From("E3"), 600), Effect("E3", Vapour("E2"), From("E6"), 600),
            Effect("E4", Vapour("E3"), From("E2"), 600), Effect("E5", Vapour("E4"), LiquorSource.Feed, 620), Effect("E6", Vapour("E5"), From("E5"), 650),
            Effect("E7", Vapour("E6"), From("E1"), 600)) with
        { Bodies = [new("B1", 300, new Dictionary<string, ActiveSignal>()), new("B2", 320, new Dictionary<string, ActiveSignal>())] };
        line = line with { Effects = [.. line.Effects.Select(effect => effect.Name == "E5" ? effect with { Bodies = ["B1", "B2"] } : effect)] };
        return new("mixed", new(line), At(1.2e4, 4.2e5, 0.5, ("E1", 1500), ("E2", 1700), ("E3", 1900), ("E4", 1700), ("B1", 2000), ("B2", 1500), ("E6", 1600), ("E7", 700)));
    }

    private static Case SharesTankAndTwoOnSteam()
    {
        Line line = Of(
            Effect("A", [HeatSource.Steam], [From(null, 0.6)], 300), Effect("B", [HeatSource.Steam], [From(null)], 150),
            Effect("C", [Vapour("A"), Vapour("B")], [From("T"), From("B", 0.5)], 420) with { Chest = new() { LineLoss = 500 } },
            Effect("D", [Vapour("C")], [From("C"), From("B")], 500)) with
        { Tanks = [new("T", "A", 1e5, null)] };
        return new("shares", new(line), At(1.8e4, 1.9e5, 0.45, ("A", 2600), ("B", 2600), ("C", 2200), ("D", 1500)));
    }

    private static Case ThermalWithFinisher()
    {
        Line line = Of(
            Effect("F1", By("J1"), LiquorSource.Feed, 250), Effect("F2", Vapour("F1"), From("F1"), 220), Effect("F3", Vapour("F2"), From("F2"), 200),
            Effect("FIN", HeatSource.Steam, From("F3"), 30)) with
        {
            Recompressors =
            [
                new Recompressor { Name = "J1", Kind = RecompressorKind.Thermal, Suction = "F1", Curve = new([(1.1, 2.2), (1.3, 1.4), (1.6, 0.85), (2.2, 0.4)]) },
            ],
        };
        return new("thermal", new(line), At(1.2e4, 3e4, 0.48, ("F1", 2300), ("F2", 2000), ("F3", 1500), ("FIN", 800)) with
        {
            FeedTemperature = 340, Motive = new Dictionary<string, MotiveConditions> { ["J1"] = new(9e5, 5, 1.4) },
        });
    }

    private static Recompressor Fan(Instrument? spray) => new()
    {
        Name = "M1", Kind = RecompressorKind.Mechanical, Suction = "E", Spray = spray, Curve = new([(2, 1.55), (12, 1.4), (25, 1.15)], 0.75),
    };

    private static Case MechanicalAlone() => new("mechanical", new(Of(Effect("E", By("M1"), LiquorSource.Feed, 800)) with { Recompressors = [Fan(null)] }),
        At(8e4, 1e5, 0.25, ("E", 2100)) with { SteamPressure = null, FeedTemperature = 374 });

    private static Case MechanicalSprayed() => new("sprayed", new(Of(Effect("E", By("M1"), LiquorSource.Feed, 800)) with { Recompressors = [Fan(Meter("S"))] }),
        At(8e4, 1e5, 0.25, ("E", 2100)) with { SteamPressure = null, FeedTemperature = 374 });

    private static Case FiveWithCascade()
    {
        Line line = Of(
            Effect("E1", HeatSource.Steam, LiquorSource.Feed, 1500), Effect("E2", Vapour("E1"), From("E1"), 1400), Effect("E3", Vapour("E2"), From("E2"), 1200),
            Effect("E4", Vapour("E3"), From("E3"), 1000), Effect("E5", Vapour("E4"), From("E4"), 900)) with
        {
            Bleeds = [new("E1", "H1", null), new("E2", "H2", null), new("E3", "pans", null)],
            Heaters = [new Heater { Name = "H1", Liquor = new Sucrose(0.9) { Name = "juice" } }, new Heater { Name = "H2", Liquor = new Sucrose(0.9) { Name = "juice" } }],
            CondensateFlashes = [new("E2", "E3"), new("E3", "E4"), new("E4", "E5")],
        };
        return new("cascade", new(line), At(2e4, 2.4e5, 0.65, ("E1", 3000), ("E2", 2600), ("E3", 2100), ("E4", 1500), ("E5", 800)) with
        {
            Bleeds = new Dictionary<string, double> { ["E3 to pans"] = 3 },
            Heaters = new Dictionary<string, HeaterConditions> { ["H1"] = new(60, 0.14, 370, 385), ["H2"] = new(60, 0.14, 355, 370) },
        });
    }

    /// <summary>The same five effects with the liquor entering in the middle and the thickest leaving the hottest.</summary>
    private static Case FiveMixed()
    {
        Case forward = FiveWithCascade();
        string?[] from = ["E2", "E5", null, "E3", "E4"];
        Line line = forward.Graph.Line with { Effects = [.. forward.Graph.Line.Effects.Select((effect, i) => effect with { Liquor = [From(from[i])] })] };
        return new("mixed-five", new(line), forward.Conditions);
    }
}
