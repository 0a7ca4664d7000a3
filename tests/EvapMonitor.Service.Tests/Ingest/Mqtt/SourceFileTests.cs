using EvapMonitor.Service.Ingest.Mqtt;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

public sealed class SourceFileTests : IDisposable
{
    private readonly string _folder = Directory.CreateTempSubdirectory("evapmonitor-sources-").FullName;

    [Fact]
    public void SoundFile_IsRead()
    {
        File.WriteAllText(Path.Combine(_folder, "secret"), "three words long\nnot this\n");
        BrokerSettings broker = Assert.Single(Read("""
            {
              // One broker of the control system.
              "brokers": [{
                "name": "gateway", "host": "gateway.example", "protocol": "3.1.1", "user": "evap", "password-file": "secret", "session-expiry-days": 3,
                "topics": [
                  {"filter": "plant/+/+/pv", "message": "number", "signal": "{1}.{2}"},
                  {"filter": "lab/#", "message": "object", "value": "v", "time": "t", "time-written": "unix-ms"},
                  {"filter": "line", "message": "members", "signals": {"flow": "N.FT-10"}},
                ],
              }],
            }
            """, out IReadOnlyList<string> problems));
        Assert.Empty(problems);
        Assert.Equal(("gateway.example:1883", false, "evapmonitor-gateway", "three words long"), (broker.Address, broker.IsVersion5, broker.ClientId, broker.Password));
        Assert.Equal([MessageShape.Number, MessageShape.Object, MessageShape.Members], broker.Topics.Select(topic => topic.Shape));
        Assert.Equal(("v", "t"), (broker.Topics[1].ValueMember, broker.Topics[1].TimeMember));
        Assert.DoesNotContain("three words", broker.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void EveryMistake_IsToldAtOnce_AndNoSecret()
    {
        Assert.Empty(Read("""
            {"brokers": [{
              "name": "a", "port": 99999, "protocol": "4", "password": "hunter-two", "colour": "red",
              "tls": {"ca": "missing.pem"},
              "topics": [
                {"filter": "a/#/b", "message": "number"},
                {"filter": "b/+", "message": "number", "signal": "{2}", "time": "t"},
                {"filter": "c", "message": "xml"}
              ]
            }, {"name": "b", "host": "h", "topics": []}]}
            """, out IReadOnlyList<string> problems));
        string[] places =
        [
            "brokers[0].host: missing", "brokers[0].port: found 99999", "brokers[0].protocol: found \"4\"", "brokers[0].user: missing", "brokers[0].colour: not known",
            "brokers[0].tls.ca: missing.pem cannot be used", "brokers[0].topics[0].filter", "brokers[0].topics[1].signal", "brokers[0].topics[1].time",
            "brokers[0].topics[2].message: found \"xml\"", "brokers[1].topics: not a list",
        ];
        Assert.Equal(places.Length, problems.Count);
        Assert.All(places, place => Assert.Contains(problems, problem => problem.StartsWith("sources.json: " + place, StringComparison.Ordinal)));
        Assert.All(problems, problem => Assert.Contains("allowed", problem, StringComparison.Ordinal));
        Assert.DoesNotContain("hunter", string.Concat(problems), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("", "not JSON")]
    [InlineData("{\"brokers\": 5}", "brokers: not a list")]
    [InlineData("[]", "allowed: an object")]
    [InlineData("{\"brokers\":[7]}", "brokers[0]: found 7")]
    [InlineData("{\"brokers\":[{\"name\":\"a\",\"host\":\"h\",\"password\":5,\"topics\":[{\"filter\":\"a\"}]}]}", "password: not a text")]
    public void OtherContent_IsToldInOneLine(string text, string told)
    {
        Assert.Empty(Read(text, out IReadOnlyList<string> problems));
        Assert.Contains(told, Assert.Single(problems), StringComparison.Ordinal);
    }

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    private IReadOnlyList<BrokerSettings> Read(string text, out IReadOnlyList<string> problems)
    {
        string path = Path.Combine(_folder, "sources.json");
        File.WriteAllText(path, text);
        return SourceFile.Read(path, out problems);
    }
}
