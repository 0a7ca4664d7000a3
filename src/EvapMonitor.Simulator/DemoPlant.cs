using System.Globalization;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Simulator;

/// <summary>The invented plant of the demo: its plant file and the stories of its lines.</summary>
public static class DemoPlant
{
    /// <summary>Days of history that a new demo begins with.</summary>
    public const int Days = StoryTime.Season;

    /// <summary>The lines of the site.</summary>
    public static IReadOnlyList<DemoLine> Lines { get; } = [new NorthLine(), new SouthLine(), new WestLine()];

    /// <summary>The plant file, with the instant from which history is accepted.</summary>
    /// <param name="start">The first reading.</param>
    /// <param name="lines">Names of the lines wanted; none: all.</param>
    public static string PlantFile(DateTimeOffset start, params ReadOnlySpan<string> lines)
    {
        string[] wanted = lines.IsEmpty ? [.. Lines.Select(line => line.Name)] : lines.ToArray();
        string from = start.UtcDateTime.AddDays(-1).ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
        return Text("site").Replace("history-from: 2026-01-01", "history-from: " + from, StringComparison.Ordinal) + string.Concat(wanted.Select(Text));
    }

    /// <summary>The readings of each line of a site that was read from the plant file.</summary>
    /// <param name="site">The site.</param>
    /// <param name="start">The first instant.</param>
    /// <exception cref="NotSupportedException">The site has a line or an instrument of which the demo knows nothing.</exception>
    public static IReadOnlyList<LineReadings> Readings(Site site, DateTimeOffset start)
    {
        ArgumentNullException.ThrowIfNull(site);
        return [.. site.Lines.Select(line =>
        {
            DemoLine story = Lines.FirstOrDefault(story => story.Name == line.Name) ?? throw new NotSupportedException($"The demo has no story of a line {line.Name}.");
            return new LineReadings(new LineSimulation(story, line, site.Atmosphere.Fixed!.Value, start), story.Faults);
        })];
    }

    private static string Text(string name)
    {
        using var text = new StreamReader(typeof(DemoPlant).Assembly.GetManifestResourceStream(name + ".yaml")!);
        return text.ReadToEnd();
    }
}
