using System.Security.Cryptography.X509Certificates;
using System.Threading.Channels;
using MQTTnet;
using MQTTnet.Exceptions;
using MQTTnet.Formatter;
using MQTTnet.Protocol;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>
/// One connection to a broker, from connecting to its end. A message is acknowledged when the intake has it on disk, in the order of arrival. When the intake
/// refuses, the connection ends with the message unacknowledged, so that the broker keeps it and sends it again.
/// </summary>
internal sealed class BrokerConnection : IAsyncDisposable
{
    /// <summary>Messages that may be on their way unacknowledged (MQTT 5).</summary>
    public const ushort ReceiveMaximum = 500;

    /// <summary>
    /// Most unacknowledged messages, and bytes of them, before the connection is ended. A broker of MQTT 3.1.1 is not bound by <see cref="ReceiveMaximum"/>, some
    /// of MQTT 5 forget it when a session is resumed, and the library's own queue has no bound.
    /// </summary>
    private const int MostWaiting = 100_000, MostWaitingBytes = 64 << 20;

    private readonly BrokerSettings _settings;
    private readonly SourceState _state;
    private readonly Intake _intake;
    private readonly TimeProvider _clock;
    private readonly MessageReader _reader;
    private readonly IMqttClient _client = new MqttClientFactory().CreateMqttClient();
    private readonly TaskCompletionSource<string> _end = new(TaskCreationOptions.RunContinuationsAsynchronously);
    private readonly Channel<(MqttApplicationMessageReceivedEventArgs Message, Task<IntakeAnswer> Answer)> _unanswered =
        Channel.CreateUnbounded<(MqttApplicationMessageReceivedEventArgs, Task<IntakeAnswer>)>(new UnboundedChannelOptions { SingleReader = true });

    private int _waiting;
    private long _waitingBytes;

    public BrokerConnection(BrokerSettings settings, SourceState state, Intake intake, TimeProvider clock)
    {
        (_settings, _state, _intake, _clock) = (settings, state, intake, clock);
        _reader = new MessageReader(settings.Topics);
        _client.ApplicationMessageReceivedAsync += Take;
        _client.DisconnectedAsync += lost =>
        {
            End(lost.Exception?.GetBaseException().Message ?? (lost.ReasonString is { Length: > 0 } text ? text : lost.Reason.ToString()));
            return Task.CompletedTask;
        };
    }

    /// <summary>Connects, calls back when subscribed, and lasts until the connection ends or is told to.</summary>
    /// <param name="connected">Called once; gets what a filter was refused or granted less for, else null.</param>
    /// <param name="stop">Ends the connection in an orderly way.</param>
    /// <returns>Why it ended.</returns>
    public async Task<string> RunAsync(Action<string?> connected, CancellationToken stop)
    {
        try
        {
            MqttClientConnectResult result = await _client.ConnectAsync(OptionsOf(_settings), stop);
            if (result.ResultCode != MqttClientConnectResultCode.Success) return $"the broker refused: {result.ResultCode}{Tail(result.ReasonString)}";
            Task answering = AnswerAsync();
            connected(await SubscribeAsync(stop));
            string why = await _end.Task.WaitAsync(stop);
            _unanswered.Writer.TryComplete();
            await answering;
            return why;
        }
        catch (OperationCanceledException) when (stop.IsCancellationRequested)
        {
            return "stopping";
        }
        catch (Exception error) when (error is MqttCommunicationException or MqttProtocolViolationException or OperationCanceledException or IOException or InvalidOperationException or TimeoutException)
        {
            return error.GetBaseException().Message;
        }
        finally
        {
            End("stopping");
            _unanswered.Writer.TryComplete();
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

    /// <summary>How a client connects to a broker.</summary>
    internal static MqttClientOptions OptionsOf(BrokerSettings settings)
    {
        MqttClientOptionsBuilder options = new MqttClientOptionsBuilder()
            .WithTcpServer(settings.Host, settings.Port)
            .WithClientId(settings.ClientId)
            .WithTimeout(TimeSpan.FromSeconds(10))
            .WithKeepAlivePeriod(TimeSpan.FromSeconds(15));
        options = settings.IsVersion5
            ? options.WithProtocolVersion(MqttProtocolVersion.V500).WithCleanStart(false).WithSessionExpiryInterval((uint)settings.SessionExpiry.TotalSeconds)
                .WithReceiveMaximum(ReceiveMaximum).WithMaximumPacketSize(2 * MessageReader.LargestPayload)
            : options.WithProtocolVersion(MqttProtocolVersion.V311).WithCleanSession(false);
        if (settings.User is not null) options = options.WithCredentials(settings.User, settings.Password);
        if (settings.Tls is { } tls)
        {
            options = options.WithTlsOptions(one =>
            {
                // Plants are often cut off from the lists of revoked certificates; a private authority rarely has one.
                one.UseTls().WithTargetHost(settings.Host).WithRevocationMode(X509RevocationMode.NoCheck);
                if (tls.Authorities is { } authorities) one.WithTrustChain(authorities);
                if (tls.Certificate is { } certificate) one.WithClientCertificates([certificate]);
            });
        }

        return options.Build();
    }

    private async Task<string?> SubscribeAsync(CancellationToken stop)
    {
        var options = new MqttClientSubscribeOptionsBuilder();
        foreach (MessageRule rule in _settings.Topics)
        {
            // Retained messages are wanted once, not after each reconnection (3.1.1 knows no such choice; there the store sees that they repeat).
            options = _settings.IsVersion5
                ? options.WithTopicFilter(filter => filter.WithTopic(rule.Filter.Text).WithAtLeastOnceQoS().WithRetainHandling(MqttRetainHandling.SendAtSubscribeIfNewSubscriptionOnly))
                : options.WithTopicFilter(rule.Filter.Text, MqttQualityOfServiceLevel.AtLeastOnce);
        }

        MqttClientSubscribeResult result = await _client.SubscribeAsync(options.Build(), stop);
        var less = result.Items.Where(item => item.ResultCode != MqttClientSubscribeResultCode.GrantedQoS1).ToList();
        return less.Count == 0 ? null
            : "not subscribed with an acknowledgement: " + string.Join(", ", less.Select(item => $"{item.TopicFilter.Topic} ({item.ResultCode})"));
    }

    private Task Take(MqttApplicationMessageReceivedEventArgs message)
    {
        message.AutoAcknowledge = false;
        // After the end nothing is answered any more: the broker sends it again.
        if (_end.Task.IsCompleted) return Task.CompletedTask;
        MqttApplicationMessage content = message.ApplicationMessage;
        DateTimeOffset now = _clock.GetUtcNow();
        _state.MessageCame(now);
        MessageVerdict verdict = _reader.Read(
            content.Topic, content.Payload, now.ToUnixTimeMilliseconds(), content.Retain, out IReadOnlyList<IncomingReading> readings, out string? wrong);
        bool promised = content.QualityOfServiceLevel != MqttQualityOfServiceLevel.AtMostOnce;
        Task<IntakeAnswer> answer = Task.FromResult(default(IntakeAnswer));
        if (verdict == MessageVerdict.Malformed) _state.CountMalformed(now, content.Topic, wrong!);
        else if (verdict == MessageVerdict.InstantUnknown) _state.CountInstantUnknown(now, content.Topic);
        else if (promised) answer = _intake.KeepAsync(_state, readings);
        else _intake.TryKeep(_state, readings);
        if (!promised) return Task.CompletedTask;
        _unanswered.Writer.TryWrite((message, answer));
        if (Interlocked.Increment(ref _waiting) > MostWaiting || Interlocked.Add(ref _waitingBytes, content.Payload.Length) > MostWaitingBytes)
            End($"the broker sent {_waiting} messages without waiting for an acknowledgement; allowed: {MostWaiting}, {MostWaitingBytes >> 20} MiB");
        return Task.CompletedTask;
    }

    private async Task AnswerAsync()
    {
        try
        {
            await foreach ((MqttApplicationMessageReceivedEventArgs message, Task<IntakeAnswer> answer) in _unanswered.Reader.ReadAllAsync())
            {
                IntakeAnswer given = await answer;
                if (given.Refusal is { } refusal)
                {
                    End("readings are refused: " + refusal);
                    return;
                }

                // Also after the end: what was taken before it need not come again.
                await message.AcknowledgeAsync(CancellationToken.None);
                Interlocked.Decrement(ref _waiting);
                Interlocked.Add(ref _waitingBytes, -message.ApplicationMessage.Payload.Length);
            }
        }
        catch (Exception error) when (error is MqttCommunicationException or ObjectDisposedException or InvalidOperationException or IOException or OperationCanceledException or NullReferenceException)
        {
            // The library drops its channel while an answer may be under way.
            End(error.GetBaseException().Message);
        }
    }

    private void End(string why) => _end.TrySetResult(why);

    private static string Tail(string? text) => string.IsNullOrEmpty(text) ? "" : $" ({text})";
}
