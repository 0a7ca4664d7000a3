using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Spool;
using Microsoft.Data.Sqlite;

namespace EvapMonitor.Service.Tests.Ingest.Spool;

public sealed class SpoolFileTests : IDisposable
{
    private readonly string _folder = Directory.CreateTempSubdirectory("evapmonitor-spool-").FullName;

    [Fact]
    public void Rows_ComeOutOldestFirst_AlsoAfterReopening()
    {
        using (SpoolFile first = SpoolFile.Open(_folder, out _)) Fill(first, 1, 2, 3);
        using SpoolFile second = SpoolFile.Open(_folder, out string? setAside);
        Fill(second, 4);
        Assert.Null(setAside);
        Assert.Equal([1, 2, 3, 4], Values(second.Read(0, 100)));
        Assert.Equal([1, 2], Values(second.Read(0, 2)));
        Assert.Equal([3, 4], Values(second.Read(2, 100)));
    }

    [Fact]
    public void WhatWasRemoved_DoesNotComeBack_AndNewRowsAreSeenAfterIt()
    {
        using SpoolFile spool = SpoolFile.Open(_folder, out _);
        Fill(spool, 1, 2, 3);
        SpoolPortion portion = spool.Read(0, 100);
        spool.Commit(null, [], portion.LastId, portion.Bytes);
        Assert.Equal(0, spool.Bytes);
        Fill(spool, 4);
        Assert.Equal([4], Values(spool.Read(portion.LastId, 100)));
        Assert.Equal([4], Values(spool.Read(0, 100)));
    }

    [Fact]
    public void BytesThatWait_AreKnownAfterReopening()
    {
        long bytes;
        using (SpoolFile first = SpoolFile.Open(_folder, out _))
        {
            Fill(first, 1, 2, 3);
            bytes = first.Bytes;
        }

        using SpoolFile second = SpoolFile.Open(_folder, out _);
        Assert.Equal(bytes, second.Bytes);
        Assert.InRange(bytes, 1, 1000);
    }

    [Fact]
    public void TornRow_IsSetAside_AndTheOthersAreRead()
    {
        using SpoolFile spool = SpoolFile.Open(_folder, out _);
        Fill(spool, 1, 2, 3);
        using (var other = new SqliteConnection($"Data Source={spool.Path};Pooling=false"))
        {
            other.Open();
            using SqliteCommand tear = other.CreateCommand();
            tear.CommandText = "UPDATE batch SET blob = zeroblob(20) WHERE id = 2";
            Assert.Equal(1, tear.ExecuteNonQuery());
        }

        SpoolPortion portion = spool.Read(0, 100);
        Assert.Equal([1, 3], Values(portion));
        Assert.Equal([2L], portion.Damaged);
        spool.Commit(null, portion.Damaged, portion.LastId, portion.Bytes);
        Assert.Equal(1, spool.CountDamaged());
        Assert.Equal(0, spool.Read(0, 100).LastId);
    }

    [Fact]
    public void FileThatIsNoDatabase_IsSetAside_AndAFreshOneTakesReadings()
    {
        File.WriteAllBytes(Path.Combine(_folder, "spool.db"), [.. Enumerable.Repeat((byte)0x5A, 8192)]);
        using SpoolFile spool = SpoolFile.Open(_folder, out string? setAside);
        Assert.True(File.Exists(setAside));
        Fill(spool, 1);
        Assert.Equal([1], Values(spool.Read(0, 100)));
    }

    [Fact]
    public void AfterALongBacklog_TheFileShrinks()
    {
        using SpoolFile spool = SpoolFile.Open(_folder, out _);
        byte[] large = SpoolBlob.Write([new IncomingBatch("s", [.. Enumerable.Range(0, 30_000).Select(i => new IncomingReading("x", new Reading(i, i, Quality.Good)))])]);
        for (int i = 0; i < 300; i++) spool.Commit(large, [], 0, 0);
        long full = new FileInfo(spool.Path).Length;
        SpoolPortion portion = spool.Read(299, 1);
        spool.Commit(null, [], portion.LastId, spool.Bytes);
        for (int i = 0; i < 60; i++)
        {
            Fill(spool, i);
            portion = spool.Read(0, 100);
            spool.Commit(null, [], portion.LastId, portion.Bytes);
        }

        Assert.InRange(new FileInfo(spool.Path).Length, 0, full * 3 / 4);
    }

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    private static void Fill(SpoolFile spool, params int[] values)
    {
        foreach (int value in values)
            spool.Commit(SpoolBlob.Write([new IncomingBatch("s", [new IncomingReading("x", new Reading(value, value, Quality.Good))])]), [], 0, 0);
    }

    private static IEnumerable<int> Values(SpoolPortion portion) => portion.Batches.SelectMany(batch => batch.Readings).Select(reading => (int)reading.Reading.Value);
}
