using EvapMonitor.Core.Advice;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Advice;

public class CleaningDueTests
{
    private static readonly DueLimits Floor = new(1000, null, null);

    [Fact]
    public void UnderTheFloorForTheDelay_IsDueSinceTheFirstHour()
    {
        DueVerdict verdict = Judge(Floor, 1100, 1050, 990, 980, 985, 970);
        Assert.Equal(DueState.Due, verdict.State);
        Assert.Equal(DueLimit.Coefficient, verdict.Binding!.Limit);
        Assert.Equal(2 * Milliseconds.Hour, verdict.Binding.Since);
        Assert.Equal(970, verdict.Binding.Value);
    }

    [Theory]
    [InlineData(1100.0, 990.0, 980.0, 985.0)]
    [InlineData(990.0, 990.0, 990.0, 1001.0, 990.0, 990.0, 990.0)]
    public void UnderTheFloorForLessThanTheDelay_IsNotDue(params double[] hours) => Assert.Equal(DueState.NotDue, Judge(Floor, hours).State);

    [Fact]
    public void BackWithinTheDeadBand_StaysDue_BeyondIt_Falls()
    {
        double[] down = [990, 990, 990, 990];
        Assert.Equal(DueState.Due, Judge(Floor, [.. down, 1015, 1015, 1015, 1015, 1015]).State);
        Assert.Equal(DueState.Due, Judge(Floor, [.. down, 1025, 1025, 1025]).State);
        Assert.Equal(DueState.NotDue, Judge(Floor, [.. down, 1025, 1025, 1025, 1025]).State);
    }

    [Fact]
    public void SeveralLimits_TheFirstReachedBinds()
    {
        var limits = new DueLimits(900, 0.5, 600);
        DueVerdict verdict = CleaningDue.Judge(limits, Hours(950, 950, 950, 950, 890, 890, 890, 890), [.. Hours(950, 950, 950, 950, 890, 890, 890, 890).Select(hour => (hour.Item1, hour.Item2 / 2000))], lastCleaningEnd: 0, now: 8 * Milliseconds.Hour);
        Assert.Equal(DueLimit.Cleanliness, verdict.Binding!.Limit);
        Assert.Equal(0.445, verdict.Binding.Value, 12);
        Assert.Equal([DueState.Due, DueState.Due, DueState.NotDue], verdict.Evidence.Select(one => one.State));
    }

    [Fact]
    public void HoursLimit_CountsFromTheLastCleaning()
    {
        var limits = new DueLimits(null, null, 100);
        DueVerdict verdict = CleaningDue.Judge(limits, [], [], lastCleaningEnd: 0, now: 130 * Milliseconds.Hour);
        Assert.Equal(DueState.Due, verdict.State);
        Assert.Equal(130, verdict.Binding!.Value);
        Assert.Equal(100 * Milliseconds.Hour, verdict.Binding.Since);
        Assert.Equal(DueState.Unknown, CleaningDue.Judge(limits, [], [], lastCleaningEnd: null, now: 0).State);
    }

    [Fact]
    public void NothingToHoldAgainstALimit_IsUnknownNotCalm()
    {
        Assert.Equal(DueState.Unknown, Judge(Floor).State);
        Assert.Equal(DueState.Unknown, CleaningDue.Judge(new DueLimits(null, 0.7, null), Hours(900), [], null, Milliseconds.Hour).State);
        // The last result is older than three days.
        Assert.Equal(DueState.Unknown, CleaningDue.Judge(Floor, Hours(1100, 1100), [], null, 80 * Milliseconds.Hour).State);
        Assert.Equal(DueState.NoLimit, CleaningDue.Judge(null, Hours(900), [], null, 0).State);
    }

    private static (long Hour, double Coefficient)[] Hours(params double[] values) => [.. values.Select((value, i) => (i * Milliseconds.Hour, value))];

    private static DueVerdict Judge(DueLimits limits, params double[] values) =>
        CleaningDue.Judge(limits, Hours(values), [.. Hours(values).Select(hour => (hour.Item1, hour.Item2 / 2000))], lastCleaningEnd: null, now: values.Length * Milliseconds.Hour);
}
