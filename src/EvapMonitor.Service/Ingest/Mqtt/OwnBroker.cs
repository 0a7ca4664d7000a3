using System.Net;
using System.Net.Sockets;
using EvapMonitor.Service.Live;
using MQTTnet;
using MQTTnet.Formatter;
using MQTTnet.Protocol;
using MQTTnet.Server;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>
/// The service's own MQTT broker, for sources on this machine: listens on the loopback address only. A message with an acknowledgement is on disk before it is
/// given. Others may subscribe; their queues are bounded.
/// </summary>
public sealed class OwnBroker(int port, Intake intake, SourceStates states, Notices notices, TimeProvider clock, ILogger<OwnBroker> log) : IHostedService, IDisposable
{
    /// <summary>The port when none is given, the one registered for MQTT.</summary>
    public const int DefaultPort = 1883;

    private const string VersionItem = "version", Notice = "own-broker";

    private readonly MessageReader _reader = new([MessageRule.OwnBroker]);
    private SourceState? _state;
    private MqttServer? _server;

    /// <summary>The port on which it listens; 0 while it does not.</summary>
    public int Port { get; private set; }

    /// <inheritdoc/>
    public async Task StartAsync(CancellationToken cancellationToken)
    {
        int wanted = port == 0 ? FreePort() : port;
        _state = states.Of("own broker", "broker", Invariant($"127.0.0.1:{wanted}"));
        MqttServer server = new MqttServerFactory().CreateMqttServer(new MqttServerOptionsBuilder()
            .WithDefaultEndpoint()
            .WithDefaultEndpointPort(wanted)
            .WithDefaultEndpointBoundIPAddress(IPAddress.Loopback)
            .WithDefaultEndpointBoundIPV6Address(IPAddress.None)
            .WithMaxPendingMessagesPerClient(100_000)
            .WithPendingMessagesOverflowStrategy(MqttPendingMessagesOverflowStrategy.DropOldestQueuedMessage)
            .Build());
        server.ValidatingConnectionAsync += connecting =>
        {
            connecting.SessionItems[VersionItem] = connecting.ProtocolVersion;
            return Task.CompletedTask;
        };
        server.InterceptingPublishAsync += TakeAsync;
        server.QueuedApplicationMessageOverwrittenAsync += dropped =>
        {
            log.OwnBrokerDropped(dropped.ReceiverClientId);
            return Task.CompletedTask;
        };
        try
        {
            await server.StartAsync();
            (_server, Port) = (server, wanted);
            _state.Connected(clock.GetUtcNow(), again: false);
            log.OwnBrokerListens(wanted);
        }
        catch (SocketException error)
        {
            server.Dispose();
            _state.Disconnected(error.Message);
            notices.Raise(Notice, $"The own MQTT broker does not listen on port {wanted}: {error.Message}. Set EVAPMONITOR_MQTT to another port or to off.");
            log.OwnBrokerAway(wanted, error.Message + ".");
        }
    }

    /// <inheritdoc/>
    public async Task StopAsync(CancellationToken cancellationToken)
    {
        if (_server is { IsStarted: true }) await _server.StopAsync(new MqttServerStopOptionsBuilder().Build());
        Port = 0;
    }

    /// <inheritdoc/>
    public void Dispose() => _server?.Dispose();

    private async Task TakeAsync(InterceptingPublishEventArgs publish)
    {
        MqttApplicationMessage message = publish.ApplicationMessage;
        SourceState state = _state!;
        DateTimeOffset now = clock.GetUtcNow();
        state.MessageCame(now);
        // What a client publishes is true now, even when others are to find it later (retained).
        MessageVerdict verdict = _reader.Read(message.Topic, message.Payload, now.ToUnixTimeMilliseconds(), retained: false, out IReadOnlyList<IncomingReading> readings, out string? wrong);
        if (verdict == MessageVerdict.Malformed)
        {
            state.CountMalformed(now, message.Topic, wrong!);
            publish.Response.ReasonCode = MqttPubAckReasonCode.PayloadFormatInvalid;
            publish.Response.ReasonString = wrong;
            return;
        }

        if (message.QualityOfServiceLevel == MqttQualityOfServiceLevel.AtMostOnce)
        {
            intake.TryKeep(state, readings);
            return;
        }

        IntakeAnswer answer = await intake.KeepAsync(state, readings, alone: true);
        if (answer.Refusal is not { } refusal) return;
        publish.ProcessPublish = false;
        // MQTT 5 can say no; in 3.1.1 an acknowledgement is always a yes, so the connection ends instead.
        if (publish.SessionItems[VersionItem] is MqttProtocolVersion.V500)
        {
            publish.Response.ReasonCode = MqttPubAckReasonCode.QuotaExceeded;
            publish.Response.ReasonString = refusal;
        }
        else
        {
            publish.CloseConnection = true;
        }
    }

    private static int FreePort()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        return ((IPEndPoint)listener.LocalEndpoint).Port;
    }
}
