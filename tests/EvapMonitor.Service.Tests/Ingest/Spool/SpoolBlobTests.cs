using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Spool;

namespace EvapMonitor.Service.Tests.Ingest.Spool;

public class SpoolBlobTests
{
    [Fact]
    public void Batches_ComeBackAsTheyWere()
    {
        var random = new Random(20260401);
        for (int round = 0; round < 200; round++)
        {
            IncomingBatch[] batches = [.. Enumerable.Range(0, random.Next(0, 6)).Select(_ => Batch(random))];
            IReadOnlyList<IncomingBatch> back = SpoolBlob.Read(SpoolBlob.Write(batches));
            Assert.Equal(batches.Select(batch => batch.Source), back.Select(batch => batch.Source));
            Assert.Equal(batches.Select(batch => batch.Readings), back.Select(batch => batch.Readings));
        }
    }

    [Fact]
    public void LiveReadings_TakeUnderTwentyBytesEach()
    {
        var readings = Enumerable.Range(0, 500).Select(i => new IncomingReading($"N{i % 40}.PT-2", new Reading(1_780_000_000_000 + i, i * 0.37, Quality.Good))).ToArray();
        Assert.InRange(SpoolBlob.Write([new IncomingBatch("gateway", readings)]).Length, 500 * 9, 500 * 20);
    }

    [Fact]
    public void AnyByteChanged_IsFound()
    {
        byte[] blob = SpoolBlob.Write([Batch(new Random(7)), Batch(new Random(8))]);
        for (int i = 0; i < blob.Length; i++)
        {
            byte[] torn = [.. blob];
            torn[i] ^= 0x10;
            Assert.Throws<InvalidDataException>(() => SpoolBlob.Read(torn));
        }
    }

    [Fact]
    public void AnyLengthCutOff_IsFound()
    {
        byte[] blob = SpoolBlob.Write([Batch(new Random(9))]);
        for (int length = 0; length < blob.Length; length++) Assert.Throws<InvalidDataException>(() => SpoolBlob.Read(blob[..length]));
    }

    private static IncomingBatch Batch(Random random) => new(
        "source " + random.Next(3),
        [.. Enumerable.Range(0, random.Next(1, 40)).Select(_ => new IncomingReading(
            "Signal-ø " + random.Next(10),
            new Reading(random.NextInt64(-10_000_000_000_000, 10_000_000_000_000), random.Next(5) == 0 ? double.NaN : random.NextDouble() * 1e6, (Quality)random.Next(3))))]);
}
