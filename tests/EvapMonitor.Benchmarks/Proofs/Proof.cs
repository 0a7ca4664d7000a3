using System.Diagnostics;
using System.Globalization;
using System.Text;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>Figures that take long, written to docs/proof/NAME.md with the commit, the machine and the seed.</summary>
internal sealed class Proof(string name, string title)
{
    private readonly StringBuilder _text = new();
    private readonly Stopwatch _clock = Stopwatch.StartNew();

    /// <summary>Adds a line of text (Markdown), and shows it.</summary>
    public void Say(string line)
    {
        Console.WriteLine(line);
        _text.AppendLine(line);
    }

    /// <summary>Adds a line with numbers, independent of culture.</summary>
    public void Say(FormattableString line) => Say(line.ToString(CultureInfo.InvariantCulture));

    /// <summary>Writes the page.</summary>
    public void Write(int? seed = null)
    {
        string root = Git("rev-parse", "--show-toplevel");
        string commit = Git("rev-parse", "--short=12", "HEAD") + (Git("status", "--porcelain").Length > 0 ? " with changes" : "");
        string head = string.Create(CultureInfo.InvariantCulture,
            $"""
            # {title}

            `./evapmonitor prove {name}`, commit {commit}, {TimeProvider.System.GetUtcNow():yyyy-MM-dd}{(seed is null ? "" : $", seed {seed}")}, {Environment.ProcessorCount} cores, took {_clock.Elapsed.TotalSeconds:0} s.


            """);
        string path = Path.Combine(root, "docs", "proof", name + ".md");
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        File.WriteAllText(path, head + _text);
        Console.WriteLine($"Written to {path}");
    }

    private static string Git(params string[] arguments)
    {
        using Process git = Process.Start(new ProcessStartInfo("git", arguments) { RedirectStandardOutput = true, WorkingDirectory = AppContext.BaseDirectory })!;
        string output = git.StandardOutput.ReadToEnd();
        git.WaitForExit();
        return output.Trim();
    }
}
