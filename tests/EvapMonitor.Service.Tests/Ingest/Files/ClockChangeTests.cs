namespace EvapMonitor.Service.Tests.Ingest.Files;

/// <summary>Copenhagen's clocks go back at 01:00 UTC on 25 October 2026 (03:00 to 02:00) and forward at 01:00 UTC on 29 March 2026 (02:00 to 03:00).</summary>
public sealed class ClockChangeTests
{
    [Fact]
    public void RepeatedHour_IsToldApartByOrder()
    {
        RecordingSink sink = RecordingSink.Of("""
            time,A
            2026-10-25 01:30,1
            2026-10-25 02:00,2
            2026-10-25 02:30,3
            2026-10-25 02:00,4
            2026-10-25 02:30,5
            2026-10-25 03:00,6
            """);
        Assert.Equal(["23:30", "00:00", "00:30", "01:00", "01:30", "02:00"], sink.Readings.Select(reading => reading.Split('T')[1][..5]));
    }

    [Fact]
    public void RepeatedHour_IsToldApartForEachSignalOfALongFile()
    {
        RecordingSink sink = RecordingSink.Of("""
            time,signal,value
            2026-10-25 02:10,A,1
            2026-10-25 02:10,B,1
            2026-10-25 02:50,A,2
            2026-10-25 02:10,A,3
            2026-10-25 02:50,B,2
            2026-10-25 02:50,A,4
            2026-10-25 02:20,B,3
            """);
        Assert.Equal(["A 00:10", "B 00:10", "A 00:50", "A 01:10", "B 00:50", "A 01:50", "B 01:20"], sink.Readings.Select(reading => reading[..2] + reading.Split('T')[1][..5]));
    }

    [Fact]
    public void HourlyRows_TakeTheSecondPassWhenTheClockStands()
    {
        RecordingSink sink = RecordingSink.Of("time,A\n2026-10-25 01:00,1\n2026-10-25 02:00,2\n2026-10-25 02:00,3\n2026-10-25 03:00,4\n");
        Assert.Equal(["23:00", "00:00", "01:00", "02:00"], sink.Readings.Select(reading => reading.Split('T')[1][..5]));
    }

    [Fact]
    public void OffsetsInTheRepeatedHour_AreTaken()
    {
        RecordingSink sink = RecordingSink.Of("time,A\n2026-10-25T02:30:00+01:00,1\n2026-10-25T02:30:00+02:00,2\n");
        Assert.Equal(["01:30", "00:30"], sink.Readings.Select(reading => reading.Split('T')[1][..5]));
    }

    [Fact]
    public void MissingHour_IsRefused()
    {
        RecordingSink sink = RecordingSink.Of("time,A\n2026-03-29 01:59,1\n2026-03-29 02:00,2\n2026-03-29 02:59:59,3\n2026-03-29 03:00,4\n");
        Assert.Equal(["00:59", "01:00"], sink.Readings.Select(reading => reading.Split('T')[1][..5]));
        Assert.Equal([3, 4], sink.Problems.Select(problem => int.Parse(problem.Split(':')[0])));
    }
}
