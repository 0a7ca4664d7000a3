using System.Diagnostics;
using MQTTnet;
using MQTTnet.Formatter;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>What the MQTT library does when nothing is done with the messages: a process that receives and acknowledges, and tells its rate.</summary>
internal static class LibraryAlone
{
    /// <summary>In the process: makes the session, or (with a number of messages) takes them and prints the seconds from the first to the last.</summary>
    public static int Receive(int port, long messages)
    {
        using IMqttClient client = new MqttClientFactory().CreateMqttClient();
        var done = new TaskCompletionSource();
        long count = 0, first = 0;
        client.ApplicationMessageReceivedAsync += async message =>
        {
            message.AutoAcknowledge = false;
            if (count == 0) first = Stopwatch.GetTimestamp();
            await message.AcknowledgeAsync(CancellationToken.None);
            if (++count == messages) done.TrySetResult();
        };
        client.ConnectAsync(new MqttClientOptionsBuilder().WithTcpServer("127.0.0.1", port).WithClientId("library-alone").WithProtocolVersion(MqttProtocolVersion.V500)
            .WithCleanStart(false).WithSessionExpiryInterval(3600).WithReceiveMaximum(500).Build()).GetAwaiter().GetResult();
        client.SubscribeAsync("#", MQTTnet.Protocol.MqttQualityOfServiceLevel.AtLeastOnce).GetAwaiter().GetResult();
        if (messages > 0)
        {
            done.Task.GetAwaiter().GetResult();
            Console.WriteLine(Invariant($"{Stopwatch.GetElapsedTime(first).TotalSeconds:0.000000}"));
        }

        client.DisconnectAsync().GetAwaiter().GetResult();
        return 0;
    }

    /// <summary>Starts such a process; gives its rate in messages per second, or NaN when it only made its session.</summary>
    public static async Task<double> RunAsync(int port, long messages)
    {
        using Process process = Process.Start(new ProcessStartInfo(
            "dotnet", [Path.Combine(AppContext.BaseDirectory, "EvapMonitor.Benchmarks.dll"), "receive", Invariant($"{port}"), Invariant($"{messages}")]) { RedirectStandardOutput = true })!;
        string said = await process.StandardOutput.ReadToEndAsync();
        await process.WaitForExitAsync();
        return messages == 0 ? double.NaN : messages / double.Parse(said, System.Globalization.CultureInfo.InvariantCulture);
    }
}
