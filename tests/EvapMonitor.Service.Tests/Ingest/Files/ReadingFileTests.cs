using System.IO.Compression;
using System.Text;
using EvapMonitor.Service.Ingest.Files;

namespace EvapMonitor.Service.Tests.Ingest.Files;

public sealed class ReadingFileTests
{
    private const string One = "time,signal,value\n2026-03-01T10:00:00Z,A,1.5\n";

    [Theory]
    [InlineData("time,signal,value\n2026-03-01T10:00:00Z,A,1.5\n2026-03-01T10:00:00Z,B,-2e-3\n")]
    [InlineData("time,signal,value\r\n2026-03-01T10:00:00Z,A,1.5\r\n2026-03-01T10:00:00Z,B,-2e-3")]
    [InlineData("TIME,Signal,Value,Quality\n2026-03-01T10:00:00Z,A,1.5,\n2026-03-01T10:00:00Z,B,-2e-3,good\n")]
    [InlineData("time,A,B\n2026-03-01T10:00:00Z,1.5,-2e-3\n")]
    [InlineData("time;A;B\n2026-03-01T10:00:00Z;1,5;-2e-3\n")]
    [InlineData("time;signal;value\n2026-03-01T11:00:00+01:00;A;1,5\n2026-03-01 11:00;B;-0,002\n")]
    [InlineData("\uFEFFtime,signal,value\n\n2026-03-01T10:00:00.000Z, A , 1.5 \n\"2026-03-01T10:00:00Z\",\"B\",\"-2e-3\"\n")]
    public void SameReadingsInAnyForm_AreTheSame(string text)
    {
        RecordingSink sink = RecordingSink.Of(text);
        Assert.Empty(sink.Problems);
        Assert.Equal(["A 2026-03-01T10:00:00Z 1.5 Good", "B 2026-03-01T10:00:00Z -0.002 Good"], sink.Readings);
    }

    [Fact]
    public void Gzip_IsUnfolded()
    {
        RecordingSink sink = RecordingSink.Of(Gzip(One));
        Assert.Equal(["A 2026-03-01T10:00:00Z 1.5 Good"], sink.Readings);
    }

    [Fact]
    public void QuotedNames_MayHoldSeparatorsAndQuotes()
    {
        RecordingSink sink = RecordingSink.Of("time;\"a;b\";\"q\"\"x\"\n2026-03-01T10:00:00Z;1;2\n");
        Assert.Equal(["a;b 2026-03-01T10:00:00Z 1 Good", "q\"x 2026-03-01T10:00:00Z 2 Good"], sink.Readings);
    }

    [Theory]
    [InlineData("good", "Good")]
    [InlineData("UNCERTAIN", "Uncertain")]
    [InlineData("Bad", "Bad")]
    // Codes of OPC UA (OPC 10000-6, A.2; from memory): Good, GoodOverload, Uncertain, UncertainLastUsableValue, Bad, BadNotConnected.
    [InlineData("0", "Good")]
    [InlineData("0x002F0000", "Good")]
    [InlineData("0x40000000", "Uncertain")]
    [InlineData("0X40900000", "Uncertain")]
    [InlineData("0x80000000", "Bad")]
    [InlineData("2156527616", "Bad")]
    public void Quality_IsAWordOrAnOpcUaCode(string written, string meant)
    {
        RecordingSink sink = RecordingSink.Of($"time,signal,value,quality\n2026-03-01T10:00:00Z,A,1,{written}\n");
        Assert.Equal([$"A 2026-03-01T10:00:00Z 1 {meant}"], sink.Readings);
    }

    [Fact]
    public void BadWithoutAValue_IsAReadingWithoutAValue()
    {
        RecordingSink sink = RecordingSink.Of("time,signal,value,quality\n2026-03-01T10:00:00Z,A,,bad\n");
        Assert.Equal(["A 2026-03-01T10:00:00Z NaN Bad"], sink.Readings);
    }

    [Fact]
    public void EmptyCellOfAWideRow_IsNoReading()
    {
        RecordingSink sink = RecordingSink.Of("time,A,B,C\n2026-03-01T10:00:00Z,,2,\n");
        Assert.Equal(["B 2026-03-01T10:00:00Z 2 Good"], sink.Readings);
        Assert.Empty(sink.Problems);
    }

    [Fact]
    public void UnknownSignals_AreCounted()
    {
        RecordingSink sink = RecordingSink.Of("time,A,X,Y\n2026-03-01T10:00:00Z,1,2,3\n2026-03-01T10:01:00Z,1,2,\n");
        Assert.Equal(2, sink.Readings.Count);
        Assert.Equal([("X", 2), ("Y", 1)], sink.Unknown.Select(pair => (pair.Key, pair.Value)));
    }

    [Theory]
    [InlineData("2026-03-01T10:00:00.1239Z", "2026-03-01T10:00:00.123Z")]
    [InlineData("2026-03-01T10:00:00.5+05:45", "2026-03-01T04:15:00.5Z")]
    [InlineData("2026-06-30T23:59:60Z", "2026-06-30T23:59:59Z")]
    [InlineData("2026-07-01 12:00", "2026-07-01T10:00:00Z")]
    public void Times_AreRead(string written, string meant) =>
        Assert.Equal([$"A {meant} 1 Good"], RecordingSink.Of($"time,signal,value\n{written},A,1\n").Readings);

    [Theory]
    [InlineData("")]
    [InlineData("\n")]
    [InlineData("signal,time,value\n2026-03-01T10:00:00Z,A,1\n")]
    [InlineData("time\n2026-03-01T10:00:00Z\n")]
    [InlineData("time,A,A\n")]
    [InlineData("time,A,\n")]
    [InlineData("time,\"A\n")]
    [InlineData("time,signal,value,qualty\n2026-03-01T10:00:00Z,A,1,bad\n")]
    [InlineData("time,signal,value,quality,more\n")]
    [InlineData("%PDF-1.7\n")]
    public void WrongHeader_IsRefused(string text)
    {
        var error = Assert.Throws<ReadingFileException>(() => RecordingSink.Of(text));
        Assert.Matches("header|column", error.Message);
    }

    [Fact]
    public void DamagedGzip_IsRefused()
    {
        byte[] whole = Gzip("time,signal,value\n" + string.Concat(Enumerable.Range(0, 5000).Select(i => $"2026-03-01T10:00:00.{i % 1000:000}Z,A,{i * 7919 % 10007}\n")));
        Assert.Throws<InvalidDataException>(() => RecordingSink.Of(whole[..(whole.Length / 2)]));
        byte[] broken = [.. whole];
        for (int i = 200; i < 260; i++) broken[i] ^= 0x5A;
        Assert.ThrowsAny<Exception>(() => RecordingSink.Of(broken));
    }

    internal static byte[] Gzip(string text)
    {
        using var folded = new MemoryStream();
        using (var gzip = new GZipStream(folded, CompressionLevel.Fastest)) gzip.Write(Encoding.UTF8.GetBytes(text));
        return folded.ToArray();
    }
}
