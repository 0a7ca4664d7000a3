using System.Globalization;
using MQTTnet;
using MQTTnet.Formatter;
using MQTTnet.Protocol;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

/// <summary>A source of messages on a broker.</summary>
public sealed class Publisher : IDisposable
{
    private readonly IMqttClient _client = new MqttClientFactory().CreateMqttClient();

    public bool IsConnected => _client.IsConnected;

    public static async Task<Publisher> ConnectAsync(int port, bool isVersion5 = true, Action<MqttClientOptionsBuilder>? more = null)
    {
        var publisher = new Publisher();
        MqttClientOptionsBuilder options = new MqttClientOptionsBuilder().WithTcpServer("127.0.0.1", port)
            .WithProtocolVersion(isVersion5 ? MqttProtocolVersion.V500 : MqttProtocolVersion.V311);
        more?.Invoke(options);
        MqttClientConnectResult result = await publisher._client.ConnectAsync(options.Build(), TestContext.Current.CancellationToken);
        Assert.Equal(MqttClientConnectResultCode.Success, result.ResultCode);
        return publisher;
    }

    public Task<MqttClientPublishResult> SendAsync(string topic, string payload, bool retain = false, int qos = 1) => _client.PublishAsync(
        new MqttApplicationMessageBuilder().WithTopic(topic).WithPayload(payload).WithRetainFlag(retain).WithQualityOfServiceLevel((MqttQualityOfServiceLevel)qos).Build(),
        TestContext.Current.CancellationToken);

    /// <summary>Sends values as objects with a time of their own, a millisecond apart.</summary>
    public async Task SendSeriesAsync(string topic, DateTimeOffset start, int from, int count)
    {
        foreach (int[] some in Enumerable.Range(from, count).Chunk(50)) await Task.WhenAll(some.Select(i => SendAsync(topic, Message(start, i))));
    }

    public static string Message(DateTimeOffset start, int i) =>
        string.Create(CultureInfo.InvariantCulture, $"{{\"value\":{i},\"time\":\"{start.AddMilliseconds(i):yyyy-MM-ddTHH:mm:ss.fffZ}\"}}");

    public void Dispose() => _client.Dispose();
}
