using System.Globalization;
using System.Runtime.CompilerServices;
using EvapMonitor.Core.Fouling;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>Least squares against the certified values of NIST/ITL StRD: coefficients and their standard deviations.</summary>
public class ReferenceSetsTests
{
    // In the Wampler sets 3 to 5 the scatter grows until the certified deviations are up to twenty million times the coefficients: what is missing of the sixth digit there is
    // under 1e-12 of a standard deviation. Filip (powers to the tenth of numbers about −6) has a condition number of about 1e15 (from memory): no method in double precision keeps more than half of the digits.
    [Theory]
    [InlineData("Norris", 11)]
    [InlineData("Pontius", 10)]
    [InlineData("NoInt1", 13)]
    [InlineData("NoInt2", 13)]
    [InlineData("Longley", 10)]
    [InlineData("Wampler1", 8)]
    [InlineData("Wampler2", 10)]
    [InlineData("Wampler3", 8)]
    [InlineData("Wampler4", 7.8)]
    [InlineData("Wampler5", 5.8)]
    [InlineData("Filip", 6)]
    public void CertifiedValues_ComeBack(string name, double digits)
    {
        (double Value, double Deviation)[] certified = Read(name, out double[][] columns, out double[] response);
        OrthogonalFit fit = OrthogonalFit.Solve(columns, response)!;
        double deviation = double.Sqrt(fit.ResidualSum / (response.Length - columns.Length));
        for (int i = 0; i < certified.Length; i++)
        {
            double tolerance = double.Pow(10, -digits);
            Assert.InRange(fit.Coefficients[i] / certified[i].Value, 1 - tolerance, 1 + tolerance);
            double standard = deviation * double.Sqrt(fit.InverseGram[i][i]);
            // Without residuals (Wampler 1 and 2) the certified deviation is 0: what is left is rounding.
            if (certified[i].Deviation == 0) Assert.InRange(standard, 0, tolerance);
            else Assert.InRange(standard / certified[i].Deviation, 1 - tolerance, 1 + tolerance);
        }
    }

    [Fact]
    public void ColumnsThatDependOnEachOther_AreRefused()
    {
        double[] one = [1, 2, 3, 4], twice = [2, 4, 6, 8];
        Assert.Null(OrthogonalFit.Solve([one, twice], [1, 0, 1, 0]));
        Assert.Null(OrthogonalFit.Solve([one, [1, 0, 0, 0], [0, 1, 0, 0], [0, 0, 1, 0], [0, 0, 0, 1]], [1, 0, 1, 0]));
    }

    private static (double Value, double Deviation)[] Read(string name, out double[][] columns, out double[] response, [CallerFilePath] string here = "")
    {
        string[] lines = File.ReadAllLines(Path.Combine(Path.GetDirectoryName(here)!, "nist", name + ".dat"));
        static string[] Words(string line) => line.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries);
        static double Number(string word) => double.Parse(word, CultureInfo.InvariantCulture);
        string[][] parameters = [.. lines[30..55].Select(Words).Where(words => words.Length == 3 && words[0][0] == 'B' && char.IsDigit(words[0][1]))];
        double[][] rows = [.. lines[60..].Select(Words).Where(words => words.Length > 1).Select(words => words.Select(Number).ToArray())];
        response = [.. rows.Select(row => row[0])];
        bool powers = rows[0].Length == 2, constant = parameters[0][0] == "B0";
        columns = [.. parameters.Select((_, i) =>
        {
            int power = constant ? i : i + 1;
            return rows.Select(row => power == 0 ? 1.0 : powers ? Power(row[1], power) : row[power]).ToArray();
        })];
        return [.. parameters.Select(words => (Number(words[1]), Number(words[2])))];
    }

    private static double Power(double x, int power) => power == 0 ? 1 : x * Power(x, power - 1);
}
