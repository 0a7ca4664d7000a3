using System.Diagnostics;
using System.Text;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class HostileTextTests
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(60);

    [Theory]
    [InlineData("", 1, 1)]
    [InlineData("# only a comment\n", 1, 1)]
    [InlineData("- a\n- b\n", 1, 1)]
    [InlineData("just text", 1, 1)]
    [InlineData("site: A\n\tlines: {}\n", 2, 1)]
    [InlineData("site: [a, b\nlines: {}\n", 1, 9)]
    [InlineData("site: A\nlines: {one: {unit: %}}\n", 2, 21)]
    [InlineData("site: A\n---\nsite: B\n", 2, 1)]
    [InlineData("site: &a A\ntime-zone: *a\n", 1, 7)]
    [InlineData("site: A\nlines: *gone\n", 2, 8)]
    [InlineData("site: !!binary QQ==\n", 1, 7)]
    [InlineData("? [a, b]\n: c\n", 1, 3)]
    [InlineData("site: A\u0000\nlines: {}\n", 1, 8)]
    [InlineData("site: A\nti\u0007me: x\n", 2, 3)]
    public void BrokenText_SaysWhere(string text, int line, int column)
    {
        PlantFileResult result = PlantFileReader.Read(text);
        Assert.Null(result.Site);
        Assert.Contains(result.Problems, p => (p.Line, p.Column) == (line, column));
        Assert.All(result.Problems, p => Assert.DoesNotContain('\n', p.ToLine("plant.yaml")));
    }

    [Fact]
    public void HalfOfASurrogatePair_SaysWhere() => Assert.Equal((1, 7), Place(Examples.OnlyProblem("site: " + '\ud800' + "\n")));

    [Fact]
    public void AliasesAndAnchors_AreAllTold()
    {
        string bomb = "a: &a [x, x]\nb: &b [*a, *a]\nc: &c [*b, *b]\nd: [*c, *c]\n";
        IReadOnlyList<PlantFileProblem> problems = PlantFileReader.Read(bomb).Problems;
        Assert.Equal(6, problems.Count(p => p.Found == "an alias"));
        Assert.Equal(3, problems.Count(p => p.Found == "an anchor"));
    }

    [Fact]
    public void EscapedControlCharacter_IsShownWrittenOut()
    {
        PlantFileProblem problem = Examples.OnlyProblem(Examples.With("site: Lyngdal", "site: \"a\\e[31m\\nb\""));
        Assert.Equal("\"a\\u001b[31m\\u000ab\"", problem.Found);
    }

    [Theory]
    [InlineData("[")]
    [InlineData("{a: ")]
    [InlineData("- ")]
    [InlineData("? ")]
    [InlineData("a:\n ")]
    public void DeepNesting_IsRefusedSoon(string opening)
    {
        var watch = Stopwatch.StartNew();
        Assert.NotEmpty(PlantFileReader.Read(string.Concat(Enumerable.Repeat(opening, 200_000 / opening.Length))).Problems);
        Assert.InRange(watch.Elapsed, TimeSpan.Zero, Patience);
    }

    [Fact]
    public void HugeFile_IsRefused()
    {
        Assert.Equal("at most 1 MiB", Examples.OnlyProblem(Examples.Small + "\n#" + new string('x', PlantFileReader.LargestFile)).Allowed);
        Assert.Equal("at most 1 MiB", Examples.OnlyProblem(new string('é', (PlantFileReader.LargestFile / 2) + 1)).Allowed);
        Assert.Equal("at most 1 MiB", Assert.Single(PlantFileReader.Read(new byte[PlantFileReader.LargestFile + 1]).Problems).Allowed);
    }

    [Theory]
    [InlineData("x{0}: 1\n")]
    [InlineData("liquors: {{x{0}: {{kind: honey}}}}\n")]
    [InlineData("    - {{name: E{0}, heating: vapour of E{0}, liquor: E{0}, area: 1 m2}}\n")]
    [InlineData("    bleeds{0}: [{{from: A, to: B}}]\n")]
    public void ManyMistakes_AreToldUpToALimitAndSoon(string row)
    {
        var text = new StringBuilder("site: A\nlines:\n  one:\n    effects:\n");
        for (int i = 0; text.Length < PlantFileReader.LargestFile - 200; i++) text.AppendFormat(null, row, i);
        var watch = Stopwatch.StartNew();
        IReadOnlyList<PlantFileProblem> problems = PlantFileReader.Read(text.ToString()).Problems;
        Assert.InRange(problems.Count, 1, Findings.Most + 1);
        Assert.InRange(watch.Elapsed, TimeSpan.Zero, Patience);
    }

    [Theory]
    [InlineData("site: [", "a, ", "]")]
    [InlineData("site: {", "a{0}: 1, ", "}")]
    [InlineData("site: \"", "\\x41", "\"")]
    [InlineData("site: 1", " ", "x")]
    [InlineData("window: ", "9", " min")]
    [InlineData("window: 1", " 1", "")]
    [InlineData("site: ", "a\n  ", "")]
    [InlineData("site: |\n", "  a\n", "")]
    [InlineData("", "#\n", "")]
    [InlineData("", "a{0}:\n", "")]
    [InlineData("site: ", "b ", ": [")]
    [InlineData("history-from: ", "2026-01-01", "T00:00:00Z")]
    public void LongTextOfOneKind_IsReadSoon(string begin, string piece, string end)
    {
        var text = new StringBuilder(begin);
        for (int i = 0; text.Length < PlantFileReader.LargestFile - 50; i++) text.Append(piece.Replace("{0}", i.ToString(), StringComparison.Ordinal));
        var watch = Stopwatch.StartNew();
        Sound(PlantFileReader.Read(text.Append(end).ToString()));
        Assert.InRange(watch.Elapsed, TimeSpan.Zero, Patience);
    }

    [Fact]
    public void ManyBleedsAndRules_AreReadSoon()
    {
        var text = new StringBuilder(Examples.Small + "\n    bleeds:\n");
        for (int i = 0; i < 15_000; i++) text.Append(null, $"    - {{from: E1, to: user{i}}}\n");
        text.Append("cleaning-rules:\n  not-together:\n");
        while (text.Length < PlantFileReader.LargestFile - 100) text.Append("  - [E1, E2]\n");
        var watch = Stopwatch.StartNew();
        Assert.Equal(15_000, Examples.Sound(text.ToString()).Lines[0].Bleeds.Count);
        Assert.InRange(watch.Elapsed, TimeSpan.Zero, Patience);
    }

    [Fact]
    public void RandomBytes_NeverThrow()
    {
        var random = new Random(20_260);
        byte[] bytes = new byte[400];
        for (int i = 0; i < 2000; i++)
        {
            random.NextBytes(bytes);
            Sound(PlantFileReader.Read(bytes));
            for (int j = 0; j < bytes.Length; j++) bytes[j] = (byte)" \n:-[]{},#&*!|>'\"%@`?a0\t~"[bytes[j] % 25];
            Sound(PlantFileReader.Read(bytes));
        }
    }

    [Fact]
    public void MutatedFiles_GiveProblemsOrASiteAndNeverThrow()
    {
        int sites = 0, refused = 0;
        string[] originals = [.. Examples.Files.Select(File.ReadAllText), Examples.Own("every-key.yaml"), Examples.Own("block-style.yaml")];
        foreach (string text in Examples.Mutations(originals, 1954, 2000, 4))
        {
            PlantFileResult result = PlantFileReader.Read(text);
            Sound(result);
            if (result.Site is null) refused++;
            else sites++;
        }

        Assert.True(sites > 30 && refused > 500, $"{sites} sites, {refused} refused: the mutations prove nothing");
    }

    private static (int Line, int Column) Place(PlantFileProblem problem) => (problem.Line, problem.Column);

    private static void Sound(PlantFileResult result)
    {
        Assert.Equal(result.Site is null, result.Problems.Count > 0);
        Assert.All(result.Problems, p => Assert.True(p.Line > 0 && p.Column > 0 && p.Found.Length > 0 && p.Allowed.Length > 0));
        if (result.Site is { } site) Assert.NotEmpty(PlantCheck.Report(site));
    }
}
