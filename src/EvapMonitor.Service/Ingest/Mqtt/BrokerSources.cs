using EvapMonitor.Service.Live;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>Keeps a connection to each broker of the sources file. One that is away never holds up the others.</summary>
public sealed class BrokerSources(IReadOnlyList<BrokerSettings> brokers, Intake intake, SourceStates states, Notices notices, TimeProvider clock, ILogger<BrokerSources> log)
    : BackgroundService
{
    private static readonly TimeSpan FirstPause = TimeSpan.FromSeconds(0.5), LongestPause = TimeSpan.FromSeconds(30);

    /// <summary>A connection that lasted this long, or brought something, starts the pauses anew.</summary>
    private static readonly TimeSpan Lasting = TimeSpan.FromSeconds(10);

    /// <inheritdoc/>
    protected override Task ExecuteAsync(CancellationToken stoppingToken) => Task.WhenAll(brokers.Select(broker => Task.Run(() => KeepAsync(broker, stoppingToken), CancellationToken.None)));

    private async Task KeepAsync(BrokerSettings broker, CancellationToken stop)
    {
        SourceState state = states.Of(broker.Name, "mqtt", broker.Address);
        string notice = "source:" + broker.Name;
        bool again = false;
        for (int attempt = 0; !stop.IsCancellationRequested; attempt++)
        {
            long began = clock.GetTimestamp(), accepted = state.Accepted;
            string why;
            await using (var connection = new BrokerConnection(broker, state, intake, clock))
            {
                why = await connection.RunAsync(
                    less =>
                    {
                        state.Connected(clock.GetUtcNow(), again);
                        again = true;
                        log.BrokerConnected(broker.Name, broker.Address);
                        if (less is null) notices.Clear(notice);
                        else notices.Raise(notice, $"The MQTT broker {broker.Name} grants less than asked for: {less}.");
                    },
                    stop);
            }

            state.Disconnected(stop.IsCancellationRequested ? null : why);
            if (stop.IsCancellationRequested) return;
            if (clock.GetElapsedTime(began) > Lasting || state.Accepted > accepted) attempt = 0;
            TimeSpan pause = PauseAfter(attempt);
            notices.Raise(notice, $"The MQTT broker {broker.Name} at {broker.Address} is not connected: {why}. What it sends with an acknowledgement waits there.");
            log.BrokerLost(broker.Name, broker.Address, why, pause.TotalSeconds);
            await Task.Delay(pause, clock, stop).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }
    }

    /// <summary>Doubles up to the longest; between half and all of it by chance, so that many programs do not come back in step after a broker's restart.</summary>
    private static TimeSpan PauseAfter(int attempt) =>
        double.Min(FirstPause.TotalSeconds * double.Pow(2, int.Min(attempt, 10)), LongestPause.TotalSeconds) * (0.5 + (0.5 * Random.Shared.NextDouble())) * TimeSpan.FromSeconds(1);
}
