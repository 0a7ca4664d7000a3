using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class TextDifferencesTests
{
    [Fact]
    public void OneLineChanged_IsOneRemovedAndOneAdded()
    {
        IReadOnlyList<ComparedLine> lines = TextDifferences.Compare("a\nb\nc\n", "a\nB\nc\n");
        Assert.Equal(
            [new(LineChange.Same, 1, 1, "a"), new(LineChange.Removed, 2, 0, "b"), new(LineChange.Added, 0, 2, "B"), new(LineChange.Same, 3, 3, "c")],
            lines);
    }

    [Theory]
    [InlineData("", "", 0)]
    [InlineData("a\n", "", 1)]
    [InlineData("", "a\nb", 2)]
    [InlineData("a\r\nb\r\n", "a\nb\n", 0)]
    [InlineData("a\nb\nc\na\nb\nb\na", "c\nb\na\nb\na\nc", 5)]
    public void Differences_AreAsFewAsCanBe(string from, string to, int fewest) =>
        Assert.Equal(fewest, TextDifferences.Compare(from, to).Count(line => line.Change != LineChange.Same));

    [Fact]
    public void AnyTwoTexts_AreGivenBackWhole_WithNoMoreDifferencesThanTheTableOfAllPairsFinds()
    {
        var random = new Random(3);
        for (int round = 0; round < 2000; round++)
        {
            string[] a = Text(random), b = Text(random);
            IReadOnlyList<ComparedLine> lines = TextDifferences.Compare(string.Join('\n', a), string.Join('\n', b));
            Assert.Equal(a, lines.Where(line => line.Change != LineChange.Added).Select(line => line.Text));
            Assert.Equal(b, lines.Where(line => line.Change != LineChange.Removed).Select(line => line.Text));
            Assert.All(lines.Where(line => line.FromLine > 0), line => Assert.Equal(a[line.FromLine - 1], line.Text));
            Assert.All(lines.Where(line => line.ToLine > 0), line => Assert.Equal(b[line.ToLine - 1], line.Text));
            Assert.Equal(a.Length + b.Length - (2 * LongestCommon(a, b)), lines.Count(line => line.Change != LineChange.Same));
        }
    }

    [Fact]
    public void TextsWithNothingInCommon_AreToldAsReplaced_HoweverLong()
    {
        string a = string.Join('\n', Enumerable.Range(0, 30_000)), b = string.Join('\n', Enumerable.Range(0, 30_000).Select(i => -i - 1));
        IReadOnlyList<ComparedLine> lines = TextDifferences.Compare("head\n" + a, "head\n" + b);
        Assert.Equal((1, 30_000, 30_000), (lines.Count(line => line.Change == LineChange.Same), lines.Count(line => line.Change == LineChange.Removed), lines.Count(line => line.Change == LineChange.Added)));
    }

    [Fact]
    public void Stretches_HoldTheirSurroundings_AndJoinWhereTheyTouch()
    {
        string[] from = [.. Enumerable.Range(1, 30).Select(i => $"{i}")], to = [.. from];
        (to[4], to[8], to[24]) = ("five", "nine", "twenty-five");
        IReadOnlyList<IReadOnlyList<ComparedLine>> stretches = TextDifferences.Stretches(TextDifferences.Compare(string.Join('\n', from), string.Join('\n', to)), 2);
        Assert.Equal(["3 4 5 five 6 7 8 9 nine 10 11", "23 24 25 twenty-five 26 27"], stretches.Select(stretch => string.Join(' ', stretch.Select(line => line.Text))));
    }

    private static string[] Text(Random random) => [.. Enumerable.Range(0, random.Next(1, 14)).Select(_ => $"line {random.Next(4)}")];

    private static int LongestCommon(string[] a, string[] b)
    {
        int[,] best = new int[a.Length + 1, b.Length + 1];
        for (int i = 1; i <= a.Length; i++)
        {
            for (int k = 1; k <= b.Length; k++) best[i, k] = a[i - 1] == b[k - 1] ? best[i - 1, k - 1] + 1 : int.Max(best[i - 1, k], best[i, k - 1]);
        }

        return best[a.Length, b.Length];
    }
}
