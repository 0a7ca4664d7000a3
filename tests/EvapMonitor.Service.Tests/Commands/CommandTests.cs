using System.Text;
using EvapMonitor.Service.Tests.Ingest.Files;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Commands;

/// <summary>Exit codes and what goes to stderr: one line for each problem, no stack of the program.</summary>
public sealed class CommandTests : IDisposable
{
    private readonly string _folder = TemporaryFolder.Create();

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    [Fact]
    public async Task Check_TellsWhatCanBeComputed()
    {
        (int exit, string said, string error) = await ChildService.CommandAsync("check", Put("plant.yaml", SmallPlant.Text));
        Assert.Equal((0, ""), (exit, error));
        Assert.Contains("E1", said);
    }

    [Fact]
    public async Task Check_TellsEveryMistake()
    {
        (int exit, string said, string error) = await ChildService.CommandAsync("check", Put("plant.yaml", SmallPlant.Text.Replace("100 m2", "100").Replace("liquor: feed", "liquor: nowhere")));
        Assert.Equal((1, ""), (exit, said));
        string[] lines = error.Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(2, lines.Length);
        Assert.All(lines, line => Assert.Matches(@"plant\.yaml:\d+:\d+ ", line));
    }

    [Theory]
    [InlineData(1, "evaluate", "nowhere.yaml", "nowhere.csv", "--out", "x")]
    [InlineData(2, "evaluate", "nowhere.yaml")]
    [InlineData(2, "dance")]
    [InlineData(1, "import", "--service", "http://127.0.0.1:1", "nowhere.csv")]
    public async Task WrongUse_IsOneLine(int code, params string[] arguments)
    {
        (int exit, _, string error) = await ChildService.CommandAsync(arguments);
        Assert.Equal(code, exit);
        Assert.NotEmpty(error.Trim());
        Assert.DoesNotContain("   at ", error);
        Assert.Single(error.Split('\n', StringSplitOptions.RemoveEmptyEntries));
    }

    [Fact]
    public async Task Evaluate_TellsRejectedRows_AndExitsWithThree()
    {
        string plant = Put("plant.yaml", SmallPlant.Text), readings = Put("april.csv", "time,FT-1,Other\n2026-04-01T10:00:00Z,60,1\n2026-04-01T10:01:00Z,x,1\n");
        (int exit, string said, string error) = await ChildService.CommandAsync("evaluate", plant, readings, "--out", Path.Combine(_folder, "out"));
        Assert.Equal(3, exit);
        Assert.Equal(["april.csv:3: FT-1: value 'x' is not a number", "Other: 2 readings, but the plant file names no such signal"], error.Split('\n', StringSplitOptions.RemoveEmptyEntries));
        Assert.StartsWith("1 readings used, 0 repeated, 1 rejected, 2 of unknown signals;", said);
    }

    [Fact]
    public async Task Evaluate_LeavesOutExcludedInstruments()
    {
        string plant = Put("plant.yaml", SmallPlant.Text), output = Path.Combine(_folder, "out");
        string readings = Put("april.csv", "time,FT-1,TT-1,FT-2,PT-2,PT-1\n" + string.Concat(Enumerable.Range(0, 180).Select(i => $"2026-04-01T{10 + (i / 60)}:{i % 60:00}:00Z,60,80,20,1.5,1.1\n")));
        string events = Put("events.csv", "time,end,line,effect,signal,kind,note\n2026-04-01T11:00:00Z,2026-04-01T12:00:00Z,one,,FT-2,instrument-excluded,plugged\n");
        (int exit, _, string error) = await ChildService.CommandAsync("evaluate", plant, readings, "--out", output, "--events", events);
        Assert.Equal((0, ""), (exit, error));
        string[][] steam = [.. (await File.ReadAllLinesAsync(Path.Combine(output, "balance.csv"), TestContext.Current.CancellationToken)).Select(row => row.Split(',')).Where(cells => cells[2] == "steam_flow")];
        Assert.Equal(36, steam.Length);
        Assert.All(steam, cells => Assert.Equal(cells[0].Contains("T11:", StringComparison.Ordinal), cells[4].Length == 0));
    }

    [Fact]
    public async Task Evaluate_TellsEveryMistakeOfTheEvents()
    {
        string plant = Put("plant.yaml", SmallPlant.Text), readings = Put("april.csv", "time,FT-1\n2026-04-01T10:00:00Z,60\n");
        string events = Put("events.csv", "time,end,line,effect,signal,kind,note\n2026-04-01T11:00:00Z,,one,,FT-9,instrument-excluded,\n2026-04-01T11:00:00Z,,one,,,instrument-excluded,\n2026-04-01T11:00:00Z,,one,,FT-1,repair,\n");
        (int exit, _, string error) = await ChildService.CommandAsync("evaluate", plant, readings, "--out", Path.Combine(_folder, "out"), "--events", events);
        Assert.Equal(1, exit);
        Assert.Equal(
            ["events.csv:2: line one has no instrument with the signal 'FT-9'", "events.csv:3: instrument-excluded needs the signal of its instrument",
                "events.csv:4: kind 'repair' is not known; allowed: cleaning, rejected-cleaning, instrument-excluded, recalibration"],
            error.Split('\n', StringSplitOptions.RemoveEmptyEntries));
    }

    [Fact]
    public async Task Evaluate_OfAGzipCutShort_Fails()
    {
        string plant = Put("plant.yaml", SmallPlant.Text), readings = Path.Combine(_folder, "cut.csv.gz");
        byte[] whole = ReadingFileTests.Gzip("time,FT-1\n" + string.Concat(Enumerable.Range(0, 3000).Select(i => $"2026-04-01T10:{i / 60 % 60:00}:{i % 60:00}Z,{i * 7919 % 10007}\n")));
        await File.WriteAllBytesAsync(readings, whole[..(whole.Length - 50)], TestContext.Current.CancellationToken);
        (int exit, _, string error) = await ChildService.CommandAsync("evaluate", plant, readings, "--out", Path.Combine(_folder, "out"));
        Assert.Equal(1, exit);
        Assert.StartsWith("cut.csv.gz: ", error);
        Assert.Single(error.Split('\n', StringSplitOptions.RemoveEmptyEntries));
    }

    private string Put(string name, string text)
    {
        string path = Path.Combine(_folder, name);
        File.WriteAllText(path, text, new UTF8Encoding(false));
        return path;
    }
}
