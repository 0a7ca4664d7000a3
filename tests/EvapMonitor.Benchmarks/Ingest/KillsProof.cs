using System.Globalization;
using EvapMonitor.Benchmarks.Proofs;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>
/// Kills the service at random instants under load, by MQTT through a broker and by HTTP, and compares what is stored with what the publishers were told was
/// taken. Arguments: kills (default 50), seed (default 7).
/// </summary>
internal static class KillsProof
{
    public static async Task<int> RunAsync(string[] arguments)
    {
        int kills = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 50;
        int seed = arguments.Length > 1 ? int.Parse(arguments[1], CultureInfo.InvariantCulture) : 7;
        var proof = new Proof("kills", "The service killed under load");
        var random = new Random(seed);
        await using Stand stand = await Stand.MakeAsync();
        (ServiceProcess service, string address) = await stand.ServeAsync();
        using AcknowledgedLoad load = await AcknowledgedLoad.StartAsync(stand, address);
        for (int i = 0; i < kills; i++)
        {
            await Task.Delay(random.Next(200, 2_500));
            await service.KillAsync();
            (service, load.Address) = await stand.ServeAsync();
            await Console.Error.WriteAsync(Invariant($"\r{i + 1} kills, {load.Acknowledged} acknowledged "));
        }

        await Task.Delay(1_000);
        await load.EndAsync();
        long stored = await load.StoredAsync(TimeSpan.FromMinutes(5));
        (long missing, long foreign, long wrong) = await load.CompareAsync();
        await service.KillAsync();
        service.Dispose();
        proof.Say($"{kills} kills (SIGKILL) at random, 0.2 to 2.5 s apart after each start, {AcknowledgedLoad.PerSecond:N0} readings a second at QoS 1 through mosquitto and batches of {AcknowledgedLoad.HttpBatch} by HTTP at the same time.");
        proof.Say("");
        proof.Say("| way | acknowledged | missing |");
        proof.Say("|---|---|---|");
        proof.Say($"| MQTT and HTTP together | {load.Acknowledged:N0} | {missing:N0} |");
        proof.Say("");
        proof.Say($"Stored {stored:N0}; of these never published {foreign:N0}, with another value than published {wrong:N0}. No reading can be there twice: the key of the table forbids it.");
        proof.Write(seed);
        return missing == 0 && foreign == 0 && wrong == 0 ? 0 : 1;
    }
}
