using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Core.Tests.Coefficients;

/// <summary>Readings as no line could have them: nothing is thrown, nothing made up, and where there is no number there is a reason.</summary>
public class IllPosedTests
{
    public static TheoryData<string> Lines => ["forward", "backward", "mixed", "cascade", "thermal", "mechanical"];

    [Theory]
    [MemberData(nameof(Lines))]
    public void InstrumentsMissingOneByOne_LeaveANumberThatIsRightOrAReason(string name)
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named(name));
        double[] readings = line.Exact();
        var order = new Random(5);
        int[] places = [.. Enumerable.Range(0, readings.Length)];
        order.Shuffle(places);
        int last = -1;
        foreach (int place in places)
        {
            readings[place] = double.NaN;
            LineWindow window = Sound(line, readings);
            int present = 0;
            foreach ((EffectWindow effect, Core.Outlook.EffectPoint truth) in window.Effects.Zip(line.Point.Effects))
            {
                if (!effect.Coefficient.IsPresent) continue;
                present++;
                // The readings are exact: what is left is the last step of the solution (1e-6 by the variables' scales).
                Assert.Equal(1, effect.Coefficient.Value / truth.Coefficient, 1e-5);
            }

            last = present;
        }

        Assert.Equal(0, last);
    }

    [Theory]
    [MemberData(nameof(Lines))]
    public void OddReadings_NeverThrow_AndHaveANumberOrAReason(string name)
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named(name));
        double[] exact = line.Exact();
        void Try(Action<double[]> spoil)
        {
            double[] readings = [.. exact];
            spoil(readings);
            Sound(line, readings);
        }

        IEnumerable<int> Of(Dimension dimension) => Enumerable.Range(0, exact.Length).Where(place => line.Instruments[place].Unit.Dimension == dimension);
        void Set(double[] readings, string signal, double value)
        {
            if (line.Instruments.Any(one => one.Signal == signal)) readings[line.PlaceOf(signal)] = value;
        }

        // No driving force anywhere: one pressure in the whole line.
        Try(readings => Array.ForEach([.. Of(Dimension.Pressure)], place => readings[place] = 5e4));
        // Feed far under boiling and far over it.
        Try(readings => Set(readings, "feed-temperature", 274));
        Try(readings => Set(readings, "feed-temperature", 470));
        // Product thinner than feed.
        Try(readings => Set(readings, "product-solids", 0.5 * exact[line.PlaceOf("feed-solids")]));
        // Each instrument stuck at zero, each flow running backwards.
        foreach (int place in Enumerable.Range(0, exact.Length)) Try(readings => readings[place] = 0);
        foreach (int place in Of(Dimension.MassFlow)) Try(readings => readings[place] = -exact[place]);
        Try(readings => Array.ForEach([.. Of(Dimension.MassFlow)], place => readings[place] = 0));
        Try(readings => Array.ForEach([.. Of(Dimension.MassFlow)], place => readings[place] *= -1));
        // All noise.
        var random = new Random(9);
        for (int draw = 0; draw < 40; draw++)
        {
            Try(readings =>
            {
                for (int place = 0; place < readings.Length; place++)
                {
                    readings[place] = line.Instruments[place].Unit.Dimension switch
                    {
                        Dimension.Pressure => 1e3 + (4e5 * random.NextDouble()),
                        Dimension.Temperature => 280 + (150 * random.NextDouble()),
                        Dimension.Fraction => 0.9 * random.NextDouble(),
                        _ => 2 * random.NextDouble() * exact[place],
                    };
                }
            });
        }
    }

    private static LineWindow Sound(InstrumentedLine line, double[] readings)
    {
        LineWindow window = line.Evaluate(readings);
        foreach (EffectWindow effect in window.Effects)
        {
            Assert.Equal(effect.Reason is null, effect.Coefficient.IsPresent);
            if (effect.Coefficient.IsPresent) Assert.True(effect.Coefficient is { Value: > 0, Standard: >= 0 and < double.PositiveInfinity });
        }

        return window;
    }
}
