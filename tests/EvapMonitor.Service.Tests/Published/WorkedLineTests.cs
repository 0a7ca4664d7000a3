using System.Globalization;
using EvapMonitor.Core.Properties;
using EvapMonitor.Service.Commands;

namespace EvapMonitor.Service.Tests.Published;

/// <summary>
/// Published triple effects through the public path: feed, solids of the product and pressures go in, no flow between the effects; the coefficients of all three must
/// come back from the balance of the line within 1 % with the steam tables instead of the books' rounded figures.
/// </summary>
public class WorkedLineTests
{
    private const double Ice = 273.15;

    [Fact]
    public async Task TripleEffect_GivesBooksCoefficients()
    {
        // Geankoplis, example 8.5-1 (problem from memory, figures recomputed so that they agree): 22680 kg/h of sugar solution, 10 → 50 %, 26.7 °C, cp 4.19 − 2.35x,
        // elevation 1.78x + 6.22x² at every pressure: boiling at 104.33, 87.11, 54.12 °C over vapours that condense at 103.98, 86.48, 51.67 °C; steam 121.1 °C;
        // areas 104.6, 105.6, 104.9 m²; U 3123, 1987, 1136; steam 8960 kg/h.
        const string liquor = "{kind: custom, boiling-point-elevation: {polynomial: [0, 0.0178, 0.000622]}, heat-capacity: {polynomial: [4190, -23.5]}, density: {polynomial: [998]}}";
        (double Area, double Vapour, double Boiling)[] effects = [(104.6, 103.98, 104.33), (105.6, 86.48, 87.11), (104.9, 51.67, 54.12)];
        Dictionary<string, double> found = await EvaluateAsync(liquor, effects, withSteam: false, ("FF", 22680), ("FX", 10), ("FT", 26.7), ("PX", 50), ("SP", Pressure(121.1)));
        Near(found, 3123, 1987, 1136);
        found = await EvaluateAsync(liquor, effects, withSteam: true, ("FF", 22680), ("FX", 10), ("FT", 26.7), ("PX", 50), ("SP", Pressure(121.1)), ("SF", 8960));
        Near(found, 3123, 1987, 1136);
    }

    [Fact]
    public async Task TripleEffectWithoutElevation_GivesBooksCoefficients()
    {
        // Coulson and Richardson, Chemical Engineering volume 2, example 14.2: 4 kg/s, 10 → 50 %, 294 K, cp 4.18, no elevation; steam 394 K, vapours 376, 359, 325 K;
        // areas 64.5, 65.6, 65.3 m²; U 3.1, 2.0, 1.1 kW/(m²·K).
        const string liquor = "{kind: custom, boiling-point-elevation: {polynomial: [0]}, heat-capacity: {polynomial: [4180]}, density: {polynomial: [998]}}";
        (double Area, double Vapour, double Boiling)[] effects = [(64.5, 376 - Ice, 376 - Ice), (65.6, 359 - Ice, 359 - Ice), (65.3, 325 - Ice, 325 - Ice)];
        Dictionary<string, double> found = await EvaluateAsync(liquor, effects, withSteam: false, ("FF", 14400), ("FX", 10), ("FT", 294 - Ice), ("PX", 50), ("SP", Pressure(394 - Ice)));
        Near(found, 3100, 2000, 1100);
    }

    private static void Near(Dictionary<string, double> found, params double[] expected)
    {
        for (int i = 0; i < expected.Length; i++)
            Assert.True(double.Abs((found[$"{i + 1}"] / expected[i]) - 1) < 0.01, $"effect {i + 1}: expected {expected[i]} within 1 %, found {found[$"{i + 1}"]}");
    }

    private static double Pressure(double celsius) => Steam.SaturationPressure(celsius + Ice) / 1000;

    private static async Task<Dictionary<string, double>> EvaluateAsync(
        string liquor, (double Area, double Vapour, double Boiling)[] effects, bool withSteam, params (string Signal, double Value)[] readings)
    {
        string folder = Directory.CreateTempSubdirectory("evapmonitor-").FullName;
        try
        {
            List<(string Signal, double Value)> all = [.. readings];
            for (int i = 0; i < effects.Length; i++) all.AddRange([($"P{i + 1}", Pressure(effects[i].Vapour)), ($"T{i + 1}", effects[i].Boiling)]);
            string plant = Path.Combine(folder, "plant.yaml"), history = Path.Combine(folder, "history.csv");
            await File.WriteAllTextAsync(plant, Plant(liquor, effects, withSteam), TestContext.Current.CancellationToken);
            string values = string.Join(',', all.Select(one => one.Value.ToString("R", CultureInfo.InvariantCulture)));
            IEnumerable<string> rows = Enumerable.Range(0, 60).Select(minute => $"2026-03-01T00:{minute:00}:00Z,{values}");
            await File.WriteAllLinesAsync(history, rows.Prepend("time," + string.Join(',', all.Select(one => one.Signal))), TestContext.Current.CancellationToken);
            Assert.Equal(0, await CommandLine.RunAsync(["evaluate", plant, history, "--out", folder], TestContext.Current.CancellationToken));
            string[] lines = await File.ReadAllLinesAsync(Path.Combine(folder, "coefficients.csv"), TestContext.Current.CancellationToken);
            string[] head = lines[0].Split(',');
            return lines[^effects.Length..].Select(line => line.Split(',')).ToDictionary(
                cells => cells[Array.IndexOf(head, "effect")], cells => double.Parse(cells[Array.IndexOf(head, "coefficient_w_m2k")], CultureInfo.InvariantCulture));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static string Plant(string liquor, (double Area, double Vapour, double Boiling)[] effects, bool withSteam)
    {
        IEnumerable<string> texts = effects.Select((effect, i) => string.Create(CultureInfo.InvariantCulture, $$$"""
                  - name: "{{{i + 1}}}"
                    heating: {{{(i == 0 ? "steam" : $"vapour of {i}")}}}
                    liquor: {{{(i == 0 ? "feed" : $"\"{i}\"")}}}
                    area: {{{effect.Area}}} m2
                    heat-loss: 0 %
                    vent: 0 %
                    vapour: {pressure: {signal: P{{{i + 1}}}, unit: kPa, accuracy: 0.05 abs}}
                    leaving: {temperature: {signal: T{{{i + 1}}}, unit: degC, accuracy: 0.02 abs, sees: flashed-liquor}}
            """));
        return $$"""
            site: Book
            time-zone: UTC
            atmosphere: 101.325 kPa
            history-from: 2026-01-01
            liquors: {it: {{liquor}}}
            lines:
              one:
                liquor: it
                feed:
                  flow: {signal: FF, unit: kg/h, accuracy: 0.5 %}
                  solids: {signal: FX, unit: "%", accuracy: 0.02 abs}
                  temperature: {signal: FT, unit: degC, accuracy: 0.5 abs}
                product:
                  solids: {signal: PX, unit: "%", accuracy: 0.02 abs}
                steam:
                  pressure: {signal: SP, unit: kPa, accuracy: 0.1 abs, at: chest}
                  {{(withSteam ? "flow: {signal: SF, unit: kg/h, accuracy: 0.5 %}" : "")}}
                effects:
            {{string.Join('\n', texts)}}
            """;
    }
}
