using System.Buffers;
using System.Globalization;
using System.Text;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Mqtt;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

public class MessageReaderTests
{
    private const long Arrival = 1_780_000_000_123;
    private const string Half = "{\"value\":1,\"signal\":\"\\ud800\"}";

    [Theory]
    [InlineData("12.5", 12.5)]
    [InlineData(" -3e2\n", -300)]
    [InlineData("0", 0)]
    public void Number_IsTheValueOfTheTopic_AtItsArrival(string payload, double value)
    {
        IncomingReading reading = Assert.Single(Read(MessageShape.Number, "plant/F-1", payload));
        Assert.Equal(new IncomingReading("plant/F-1", new Reading(Arrival, value, Quality.Good)), reading);
    }

    [Theory]
    [InlineData("{\"value\":1.5}", 1.5, Quality.Good, Arrival)]
    [InlineData("{\"value\":1.5,\"time\":\"2026-03-01T14:05:00.250Z\"}", 1.5, Quality.Good, 1_772_373_900_250)]
    [InlineData("{\"value\":1.5,\"time\":\"2026-03-01T15:05:00+01:00\",\"quality\":\"uncertain\"}", 1.5, Quality.Uncertain, 1_772_373_900_000)]
    [InlineData("{\"value\":null,\"quality\":\"bad\"}", double.NaN, Quality.Bad, Arrival)]
    [InlineData("{\"quality\":2147483648}", double.NaN, Quality.Bad, Arrival)]
    [InlineData("{\"value\":true,\"quality\":\"0x40000000\",\"else\":[1]}", 1, Quality.Uncertain, Arrival)]
    public void Object_HasNamedMembers(string payload, double value, Quality quality, long at)
    {
        IncomingReading reading = Assert.Single(Read(MessageShape.Object, "F-1", payload));
        Assert.Equal(new IncomingReading("F-1", new Reading(at, value, quality)), reading);
    }

    [Fact]
    public void Object_MayNameItsSignal() =>
        Assert.Equal("N.FT-10", Assert.Single(Read(MessageShape.Object, "gateway", "{\"signal\":\"N.FT-10\",\"value\":1}")).Signal);

    [Theory]
    [InlineData(TimeWritten.UnixMilliseconds, "1780000000123", 1_780_000_000_123)]
    [InlineData(TimeWritten.UnixSeconds, "1780000000.123", 1_780_000_000_123)]
    [InlineData(TimeWritten.UnixSeconds, "1780000000", 1_780_000_000_000)]
    public void UnixTimes_AreReadAsStated(TimeWritten written, string time, long at)
    {
        MessageRule rule = Rule(MessageShape.Object) with { TimeWritten = written, TimeMember = "t", ValueMember = "v" };
        Assert.Equal(at, Assert.Single(Read(rule, "a", $"{{\"v\":1,\"t\":{time}}}")).Reading.At);
    }

    [Fact]
    public void Members_AreSignals_WithOneTime()
    {
        MessageRule rule = Rule(MessageShape.Members, "line/+") with { Signal = SignalName.Read("{1}.{member}", 1, true, out _)! };
        IReadOnlyList<IncomingReading> readings = Read(rule, "line/N", "{\"time\":\"2026-03-01T14:05:00Z\",\"FT-1\":1,\"TT-1\":2.5,\"state\":\"on\",\"PT-1\":null}");
        Assert.Equal(["N.FT-1", "N.TT-1"], readings.Select(reading => reading.Signal));
        Assert.All(readings, reading => Assert.Equal(1_772_373_900_000, reading.Reading.At));
    }

    [Fact]
    public void Members_CanBeListed()
    {
        MessageRule rule = Rule(MessageShape.Members) with { Signals = new Dictionary<string, string> { ["flow"] = "N.FT-10" } };
        Assert.Equal("N.FT-10", Assert.Single(Read(rule, "line", "{\"flow\":1,\"other\":2}")).Signal);
    }

    [Theory]
    [InlineData(MessageShape.Number, "", "is not a number")]
    [InlineData(MessageShape.Number, "NaN", "is not a number")]
    [InlineData(MessageShape.Number, "1,5", "is not a number")]
    [InlineData(MessageShape.Number, "12 t/h", "is not a number")]
    [InlineData(MessageShape.Object, "12", "not a JSON object")]
    [InlineData(MessageShape.Object, "{\"value\":1", "not JSON")]
    [InlineData(MessageShape.Object, "{\"value\":\"1\"}", "value \"1\" is not a number")]
    [InlineData(MessageShape.Object, "{\"value\":1e999}", "is not a number")]
    [InlineData(MessageShape.Object, "{}", "there is no value")]
    [InlineData(MessageShape.Object, "{\"value\":1,\"time\":\"2026-03-01T14:05:00\"}", "is not of the form")]
    [InlineData(MessageShape.Object, "{\"value\":1,\"time\":\"yesterday\"}", "is not of the form")]
    [InlineData(MessageShape.Object, "{\"value\":1,\"time\":5}", "is not of the form")]
    [InlineData(MessageShape.Object, "{\"value\":1,\"quality\":\"fine\"}", "is not good, uncertain, bad")]
    [InlineData(MessageShape.Object, "{\"value\":1,\"signal\":7}", "is not text")]
    [InlineData(MessageShape.Object, "{\"value\":1,\"signal\":\"\"}", "0 letters")]
    [InlineData(MessageShape.Object, Half, "Unicode")]
    [InlineData(MessageShape.Members, "{\"state\":\"on\"}", "no member is a signal")]
    [InlineData(MessageShape.Object, "[[[[[[[[[[[[[[[[[[[[", "not JSON")]
    public void Malformed_SaysWhatIsWrong(MessageShape shape, string payload, string reason)
    {
        MessageVerdict verdict = new MessageReader([Rule(shape)]).Read("a", Bytes(payload), Arrival, false, out IReadOnlyList<IncomingReading> _, out string? wrong);
        Assert.Equal(MessageVerdict.Malformed, verdict);
        Assert.Contains(reason, wrong, StringComparison.Ordinal);
    }

    [Fact]
    public void TooLarge_IsMalformed()
    {
        Assert.Equal(MessageVerdict.Malformed, new MessageReader([Rule(MessageShape.Number)]).Read("a", Bytes(new string(' ', MessageReader.LargestPayload + 1)), Arrival, false, out _, out string? wrong));
        Assert.Contains(MessageReader.LargestPayload.ToString(CultureInfo.InvariantCulture), wrong, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(MessageShape.Number, "1.5", MessageVerdict.InstantUnknown)]
    [InlineData(MessageShape.Object, "{\"value\":1.5}", MessageVerdict.InstantUnknown)]
    [InlineData(MessageShape.Object, "{\"value\":1.5,\"time\":\"2026-03-01T14:05:00Z\"}", MessageVerdict.Readings)]
    public void Retained_CountsOnlyWithItsTime(MessageShape shape, string payload, object verdict) =>
        Assert.Equal(verdict, new MessageReader([Rule(shape)]).Read("a", Bytes(payload), Arrival, retained: true, out _, out _));

    [Fact]
    public void TheFirstRuleThatMatches_Holds()
    {
        var reader = new MessageReader([Rule(MessageShape.Object, "a/+"), Rule(MessageShape.Number)]);
        Assert.Equal(MessageVerdict.Malformed, reader.Read("a/b", Bytes("1"), Arrival, false, out _, out _));
        Assert.Equal(MessageVerdict.Readings, reader.Read("b", Bytes("1"), Arrival, false, out _, out _));
    }

    [Fact]
    public void HostileBytes_NeverThrow()
    {
        var random = new Random(20260402);
        string[] seeds = ["{\"value\":1.5,\"time\":\"2026-03-01T14:05:00Z\",\"quality\":\"good\",\"signal\":\"a\"}", "12.5", Half];
        var readers = Enum.GetValues<MessageShape>().Select(shape => new MessageReader([Rule(shape)])).ToList();
        for (int i = 0; i < 20_000; i++)
        {
            byte[] payload = Encoding.UTF8.GetBytes(seeds[i % seeds.Length]);
            for (int change = random.Next(1, 5); change > 0; change--) payload[random.Next(payload.Length)] = (byte)random.Next(256);
            foreach (MessageReader reader in readers)
            {
                MessageVerdict verdict = reader.Read("a", new ReadOnlySequence<byte>(payload), Arrival, i % 2 == 0, out IReadOnlyList<IncomingReading> readings, out string? wrong);
                Assert.Equal(verdict == MessageVerdict.Malformed, wrong is not null);
                if (verdict == MessageVerdict.Readings) Assert.All(readings, one => Assert.True(double.IsFinite(one.Reading.Value) || one.Reading.Quality == Quality.Bad));
            }
        }
    }

    private static MessageRule Rule(MessageShape shape, string filter = "#") =>
        new(TopicFilter.Read(filter, out _)!, shape) { Signal = shape == MessageShape.Members ? SignalName.Member : SignalName.Topic };

    private static ReadOnlySequence<byte> Bytes(string text) => new(Encoding.UTF8.GetBytes(text));

    private static IReadOnlyList<IncomingReading> Read(MessageShape shape, string topic, string payload) => Read(Rule(shape), topic, payload);

    private static IReadOnlyList<IncomingReading> Read(MessageRule rule, string topic, string payload)
    {
        MessageVerdict verdict = new MessageReader([rule]).Read(topic, Bytes(payload), Arrival, false, out IReadOnlyList<IncomingReading> readings, out string? wrong);
        Assert.Null(wrong);
        Assert.Equal(MessageVerdict.Readings, verdict);
        return readings;
    }
}
