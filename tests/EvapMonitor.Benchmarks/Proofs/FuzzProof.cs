using System.Buffers;
using System.Diagnostics;
using System.Globalization;
using System.Text;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Simulator;
using NodaTime;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>
/// A million mutated inputs through everything that reads from outside: MQTT payloads, HTTP bodies, history files, plant files. None may throw; what is taken must
/// be finite and named. Arguments: inputs in all (default 1,000,000), seed (default 11).
/// </summary>
internal static class FuzzProof
{
    public static Task<int> RunAsync(string[] arguments)
    {
        int inputs = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 1_000_000;
        int seed = arguments.Length > 1 ? int.Parse(arguments[1], CultureInfo.InvariantCulture) : 11;
        var proof = new Proof("fuzz", "Mutated inputs through everything that reads from outside");
        proof.Say("| input | tried | taken as sound | threw | slowest, ms |");
        proof.Say("|---|---|---|---|---|");
        var start = new DateTimeOffset(2026, 1, 1, 0, 0, 0, TimeSpan.Zero);
        string plant = DemoPlant.PlantFile(start);
        string history = ImportProof.DemoHistory(start, start.AddMinutes(20));
        long threw = 0;
        var reader = new MessageReader([MessageRule.OwnBroker]);
        threw += Run(proof, "MQTT payload", inputs * 4 / 10, seed, ["12.5", """{"value":1.5,"time":"2026-03-01T14:05:00Z","quality":"good","signal":"N.FT-10"}""", """{"a":1,"b":[{"c":null}]}"""],
            text => reader.Read("N.FT-10", new ReadOnlySequence<byte>(text), 1_780_000_000_000, false, out IReadOnlyList<IncomingReading> taken, out _) == MessageVerdict.Malformed || taken.All(Sound));
        threw += Run(proof, "HTTP body", inputs * 3 / 10, seed + 1, ["""{"readings":[{"signal":"N.FT-10","at":"2026-03-01T14:05:00Z","value":1.2,"quality":"good"},{"signal":"B","at":"2026-03-01T15:05:00+01:00","value":null,"quality":"bad"}]}"""],
            text => ReadingBody.Read(text, out string? wrong) is { } taken && (wrong is not null || taken.All(Sound)));
        threw += Run(proof, "history file", inputs * 2 / 10, seed + 2, [history, "time;signal;value;quality\n2026-10-25 02:30:00;A;1,5;good\n2026-10-25 02:10:00;A;1,6;0x80000000\n", "time,signal,value\n2026-03-01T14:05:00Z,\"A\",1e3\n"], ReadFile);
        threw += Run(proof, "plant file", inputs - (inputs * 9 / 10), seed + 3, [plant], text => PlantFileReader.Read(text) is var result && (result.Site is null) == (result.Problems.Count > 0));
        proof.Write(seed);
        return Task.FromResult(threw == 0 ? 0 : 1);
    }

    private static long Run(Proof proof, string name, int inputs, int seed, string[] starts, Func<byte[], bool> take)
    {
        var random = new Random(seed);
        byte[][] originals = [.. starts.Select(Encoding.UTF8.GetBytes)];
        long threw = 0, sound = 0;
        double slowest = 0;
        for (int i = 0; i < inputs; i++)
        {
            byte[] text = Mutate(originals[random.Next(originals.Length)], random);
            long began = Stopwatch.GetTimestamp();
            try
            {
                if (take(text)) sound++;
                else threw += Tell(name, "what was taken is not sound", text);
            }
            catch (ReadingFileException)
            {
                // A file without a usable header is refused in words.
                sound++;
            }
            catch (Exception error)
            {
                threw += Tell(name, error.GetType().Name + ": " + error.Message, text);
            }

            slowest = double.Max(slowest, Stopwatch.GetElapsedTime(began).TotalMilliseconds);
        }

        proof.Say($"| {name} | {inputs:N0} | {sound:N0} | {threw:N0} | {slowest:0.0} |");
        return threw;
    }

    private static int Tell(string name, string why, byte[] text)
    {
        Console.Error.WriteLine($"{name}: {why}: {Convert.ToBase64String(text.AsSpan(0, int.Min(text.Length, 300)))}");
        return 1;
    }

    private static bool Sound(IncomingReading reading) => reading.Signal.Length > 0 && (double.IsFinite(reading.Reading.Value) || reading.Reading.Quality == Quality.Bad);

    private static bool ReadFile(byte[] text)
    {
        var sink = new CheckingSink();
        using var stream = new MemoryStream(text);
        new ReadingFile(stream, DateTimeZoneProviders.Tzdb["Europe/Copenhagen"], 0, long.MaxValue, sink).Read();
        return sink.Sound;
    }

    /// <summary>One to eight changes: a byte, a stretch doubled, cut or moved, a hostile piece put in.</summary>
    private static byte[] Mutate(byte[] original, Random random)
    {
        string[] pieces = ["\"", "{", "[", "\0", "1e999", "-", "NaN", "\ud7ff", "\r\n", ";", ",", ": ", "&a", "*a", "\\ud800", "9999999999999999999", "    ", "\t"];
        List<byte> text = [.. original];
        for (int change = random.Next(1, 9); change > 0 && text.Count > 0; change--)
        {
            int at = random.Next(text.Count), length = int.Min(random.Next(1, 40), text.Count - at);
            switch (random.Next(5))
            {
                case 0: text[at] = (byte)random.Next(256); break;
                case 1: text.InsertRange(at, text.GetRange(at, length)); break;
                case 2: text.RemoveRange(at, length); break;
                case 3: text.InsertRange(at, Encoding.UTF8.GetBytes(pieces[random.Next(pieces.Length)])); break;
                default: (text[at], text[random.Next(text.Count)]) = (text[random.Next(text.Count)], text[at]); break;
            }
        }

        return [.. text];
    }

    private sealed class CheckingSink : IReadingSink
    {
        public bool Sound { get; private set; } = true;

        public int KeyOf(string signal) => 0;

        public void Take(int key, in Reading reading) => Sound &= double.IsFinite(reading.Value) || reading.Quality == Quality.Bad;

        public void TakeUnknown(string signal)
        {
        }

        public void Reject(long line, string reason) => Sound &= line > 0 && reason.Length > 0;

        public bool RowDone(long line) => true;
    }
}
