using System.Text;

namespace EvapMonitor.Service.Tests.Ingest.Files;

public sealed class BadRowTests
{
    private const string Form = "is not a time such as 2026-03-01T14:05:00Z or 2026-03-01 14:05:00";

    [Theory]
    [InlineData("yesterday,A,1", "time 'yesterday' " + Form)]
    [InlineData(",A,1", "time '' " + Form)]
    [InlineData("2026-02-30T10:00:00Z,A,1", "time '2026-02-30T10:00:00Z' " + Form)]
    [InlineData("2026-03-01T24:00:00Z,A,1", "time '2026-03-01T24:00:00Z' " + Form)]
    [InlineData("2026-03-01T10:00:00+0100,A,1", "time '2026-03-01T10:00:00+0100' " + Form)]
    [InlineData("03/01/2026 10:00,A,1", "time '03/01/2026 10:00' " + Form)]
    [InlineData("2024-12-31T23:59:59Z,A,1", "time '2024-12-31T23:59:59Z' is before the plant file's history-from")]
    [InlineData("2026-12-01T00:00:01Z,A,1", "time '2026-12-01T00:00:01Z' is more than 10 minutes ahead")]
    [InlineData("2026-03-29 02:30,A,1", "time '2026-03-29 02:30' does not exist in Europe/Copenhagen: clocks were put forward over it")]
    [InlineData("2026-03-01T10:00:00Z,A", "the row needs 4 columns as the header has")]
    [InlineData("2026-03-01T10:00:00Z,A,1,good,5", "the row needs 4 columns as the header has")]
    [InlineData("2026-03-01T10:00:00Z,A,\"1", "a quote is not closed")]
    [InlineData("2026-03-01T10:00:00Z,A,\"1\"2", "a quote is not closed")]
    [InlineData("2026-03-01T10:00:00Z,A,", "no value")]
    [InlineData("2026-03-01T10:00:00Z,A,n/a", "value 'n/a' is not a number")]
    [InlineData("2026-03-01T10:00:00Z,A,NaN", "value 'NaN' is not a number")]
    [InlineData("2026-03-01T10:00:00Z,A,1e999", "value '1e999' is not a number")]
    [InlineData("2026-03-01T10:00:00Z,A,1 000", "value '1 000' is not a number")]
    [InlineData("2026-03-01T10:00:00Z,A,1,fine", "quality 'fine' is none of good, uncertain, bad or an OPC UA status code")]
    [InlineData("2026-03-01T10:00:00Z,A,1,-1", "quality '-1' is none of good, uncertain, bad or an OPC UA status code")]
    [InlineData("2026-03-01T10:00:00Z,,1", "no signal is named")]
    [InlineData("2026-03-01T10:00:00Z,A\0,1", "the line holds a zero byte: not a text file")]
    public void BadRow_IsToldWithItsLine_AndTheNextIsRead(string row, string reason)
    {
        RecordingSink sink = RecordingSink.Of($"time,signal,value,quality\n\n{row}\n2026-03-01T10:00:00Z,B,2\n");
        Assert.Equal([$"3: {reason}"], sink.Problems);
        Assert.Equal(["B 2026-03-01T10:00:00Z 2 Good"], sink.Readings);
    }

    [Theory]
    [InlineData("2026-03-01T10:00:00Z,1", "2 columns where the header has 3")]
    [InlineData("2026-03-01T10:00:00Z,1,2,3", "4 columns where the header has 3")]
    [InlineData("2026-03-01T10:00:00Z,1,\"2", "a quote is not closed")]
    [InlineData("soon,1,2", "time 'soon' " + Form)]
    public void BadWideRow_GivesNoReading(string row, string reason)
    {
        RecordingSink sink = RecordingSink.Of($"time,A,B\n{row}\n2026-03-01T10:01:00Z,3,4\n");
        Assert.Equal([$"2: {reason}"], sink.Problems);
        Assert.Equal(["A 2026-03-01T10:01:00Z 3 Good", "B 2026-03-01T10:01:00Z 4 Good"], sink.Readings);
    }

    [Fact]
    public void BadCell_LeavesTheOthersOfItsRow()
    {
        RecordingSink sink = RecordingSink.Of("time;A;B;C\n2026-03-01T10:00:00Z;1;#REF!;1.234,5\n");
        Assert.Equal(["2: B: value '#REF!' is not a number", "2: C: value '1.234,5' is not a number"], sink.Problems);
        Assert.Equal(["A 2026-03-01T10:00:00Z 1 Good"], sink.Readings);
    }

    [Fact]
    public void LongLinesAndNames_AreCutOff()
    {
        string name = new('s', 201), line = new('9', (1 << 20) + 70_000);
        RecordingSink sink = RecordingSink.Of($"time,signal,value\n2026-03-01T10:00:00Z,{name},1\n{line}\n2026-03-01T10:00:00Z,A,1\n{line}");
        Assert.Equal(["2: the signal's name is longer than 200 bytes", "3: the line is longer than 1048576 bytes", "5: the line is longer than 1048576 bytes"], sink.Problems);
        Assert.Single(sink.Readings);
    }

    [Fact]
    public void WrongBytes_AreShownSafely()
    {
        byte[] file = [.. Encoding.ASCII.GetBytes("time,signal,value\n2026-03-01T10:00:00Z,A,"), 0x1B, 0xFF, 0x07, (byte)'\n'];
        Assert.Equal(["2: value '·\uFFFD·' is not a number"], RecordingSink.Of(file).Problems);
    }
}
