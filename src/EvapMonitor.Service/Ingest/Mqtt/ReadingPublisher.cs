using System.Globalization;
using System.Text.Json;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Store;
using MQTTnet;
using MQTTnet.Exceptions;
using MQTTnet.Protocol;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>Publishes readings to a broker, as a gateway of a plant would: a JSON object for each, with its time, acknowledged by the broker.</summary>
internal sealed class ReadingPublisher(BrokerSettings broker, string topic) : IAsyncDisposable
{
    /// <summary>Messages on their way at a time.</summary>
    private const int Together = 50;

    private readonly IMqttClient _client = new MqttClientFactory().CreateMqttClient();

    /// <summary>Publishes readings; connects first where there is no connection.</summary>
    /// <returns>Null when the broker has acknowledged all of them, else why not: they are to be published again, which changes nothing for those that came through.</returns>
    public async Task<string?> PublishAsync(IEnumerable<IncomingReading> readings, CancellationToken stop)
    {
        try
        {
            if (!_client.IsConnected) await _client.ConnectAsync(BrokerConnection.OptionsOf(broker), stop);
            foreach (IncomingReading[] some in readings.Chunk(Together))
            {
                MqttClientPublishResult[] results = await Task.WhenAll(some.Select(reading => _client.PublishAsync(MessageOf(reading), stop)));
                if (Array.Find(results, result => !result.IsSuccess) is { } refused) return $"the broker refused: {refused.ReasonCode} {refused.ReasonString}";
            }

            return null;
        }
        catch (Exception error) when (error is MqttCommunicationException or MqttProtocolViolationException or InvalidOperationException or IOException or TimeoutException)
        {
            // The library tells a cancellation in the same ways as a failure.
            stop.ThrowIfCancellationRequested();
            return error.GetBaseException().Message;
        }
    }

    public async ValueTask DisposeAsync()
    {
        try
        {
            using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(2));
            if (_client.IsConnected) await _client.DisconnectAsync(new MqttClientDisconnectOptions(), limit.Token);
        }
        catch (Exception error) when (error is MqttCommunicationException or OperationCanceledException or InvalidOperationException or IOException)
        {
            // It is gone already.
        }

        _client.Dispose();
    }

    private MqttApplicationMessage MessageOf(IncomingReading reading) => new MqttApplicationMessageBuilder()
        .WithTopic(topic)
        .WithQualityOfServiceLevel(MqttQualityOfServiceLevel.AtLeastOnce)
        .WithPayload(JsonSerializer.SerializeToUtf8Bytes(new
        {
            signal = reading.Signal,
            time = Instant.FromMilliseconds(reading.Reading.At).ToString("yyyy-MM-ddTHH:mm:ss.fffZ", CultureInfo.InvariantCulture),
            value = double.IsNaN(reading.Reading.Value) ? (double?)null : reading.Reading.Value,
            quality = reading.Reading.Quality switch { Quality.Good => "good", Quality.Uncertain => "uncertain", _ => "bad" },
        }))
        .Build();
}
