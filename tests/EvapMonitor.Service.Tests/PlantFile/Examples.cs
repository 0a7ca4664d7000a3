using System.Text;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

internal static class Examples
{
    public static IReadOnlyList<string> Files { get; } = Directory.GetFiles(Path.Combine(AppContext.BaseDirectory, "examples"), "*.yaml");

    public static string Text(string name) => File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "examples", name));

    public static string Own(string name) => File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "PlantFile", name));

    /// <summary>The smallest sound file; tests change a piece of it.</summary>
    public const string Small = """
        site: Lyngdal
        time-zone: UTC
        atmosphere: 1013 mbar
        history-from: 2026-01-01
        lines:
          one:
            liquor: water
            feed:
              flow: {signal: F, unit: t/h, accuracy: 1 %}
              solids: {signal: X, unit: "%", accuracy: 0.3 abs}
            effects:
            - name: E1
              heating: steam
              liquor: feed
              area: 610 m2
            - name: E2
              heating: vapour of E1
              liquor: E1
              area: 610 m2
        """;

    public static string With(string old, string changed) =>
        Small.Contains(old, StringComparison.Ordinal) ? Small.Replace(old, changed, StringComparison.Ordinal) : throw new ArgumentException("not in the file: " + old);

    /// <summary>Files with a few small changes each: a sign in place of another, a piece left out, put in, or repeated elsewhere.</summary>
    public static IEnumerable<string> Mutations(IReadOnlyList<string> originals, int seed, int count, int mostChanges)
    {
        const string Signs = " \n:-[]{},#&*!|>'\"%@?a09~±²°\t.E";
        var random = new Random(seed);
        for (int i = 0; i < count; i++)
        {
            var text = new StringBuilder(originals[i % originals.Count]);
            for (int changes = random.Next(1, mostChanges + 1); changes > 0; changes--)
            {
                int at = random.Next(text.Length);
                int length = Math.Min(random.Next(1, 30), text.Length - at);
                switch (random.Next(4))
                {
                    case 0: text[at] = Signs[random.Next(Signs.Length)]; break;
                    case 1: text.Remove(at, length); break;
                    case 2: text.Insert(at, Signs[random.Next(Signs.Length)]); break;
                    default: text.Insert(random.Next(text.Length), text.ToString(at, length)); break;
                }
            }

            yield return text.ToString();
        }
    }

    /// <summary>On what the coefficients of a line rest.</summary>
    public static IReadOnlyList<CoefficientBasis> Bases(Line line) =>
        CoefficientBasis.Of(line, line.Liquor.Always ?? line.Liquor.ByValue.Values.Last(), unit => AssumedAccuracy.For(unit, null));

    public static Site Sound(string text)
    {
        PlantFileResult result = PlantFileReader.Read(text);
        Assert.Empty(result.Problems.Select(p => p.ToLine("plant.yaml")));
        return Assert.IsType<Site>(result.Site);
    }

    public static PlantFileProblem OnlyProblem(string text)
    {
        PlantFileResult result = PlantFileReader.Read(text);
        Assert.Null(result.Site);
        Assert.True(result.Problems.Count == 1, string.Join('\n', result.Problems.Select(p => p.ToLine("plant.yaml"))));
        return result.Problems[0];
    }
}
