using System.Diagnostics;
using System.Globalization;
using System.Net.Http.Headers;
using System.Text.Json;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Simulator;
using Npgsql;
using NpgsqlTypes;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>Five million readings through the whole import of a separate service process, beside a plain COPY of as many rows into the same table in the same run.</summary>
internal static class ImportProof
{
    private const int Seed = 7, Signals = 33, Rows = 151_516;

    public static async Task<int> RunAsync(string[] arguments)
    {
        int rows = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : Rows;
        var proof = new Proof("import", "Five million readings imported");
        string folder = Directory.CreateTempSubdirectory("evapmonitor-import-").FullName;
        // The private server runs as another user when this runs as root: it must be able to pass through.
        if (!OperatingSystem.IsWindows()) File.SetUnixFileMode(folder, (UnixFileMode)0b111_101_101);
        try
        {
            var start = new DateTimeOffset(2026, 1, 1, 0, 0, 0, TimeSpan.Zero);
            string plant = Path.Combine(folder, "plant.yaml"), history = Path.Combine(folder, "history.csv");
            await File.WriteAllTextAsync(plant, DemoPlant.PlantFile(start, "north"));
            WriteHistory(history, start, rows);
            proof.Say($"{(long)rows * Signals:N0} readings of {Signals} signals in a wide CSV of {new FileInfo(history).Length / 1e6:0} MB.");
            proof.Say("");
            using var service = ServiceProcess.Start(plant, Path.Combine(folder, "data"));
            using var http = new HttpClient { BaseAddress = new Uri(await service.AddressAsync()), Timeout = TimeSpan.FromMinutes(10) };
            await using NpgsqlDataSource database = NpgsqlDataSource.Create(await service.ConnectionAsync());
            double floor = await CopyAsync(database, start, rows, withKey: true), bare = await CopyAsync(database, start, rows, withKey: false);
            (double seconds, JsonElement first) = await ImportAsync(http, history);
            long memory = service.PeakMemory();
            long stored = await CountAsync(database);
            (double again, JsonElement second) = await ImportAsync(http, history);
            proof.Say("| what | readings/s | to the floor |");
            proof.Say("|---|---|---|");
            proof.Say($"| COPY into a table like it, without a key | {(long)rows * Signals / bare:N0} | |");
            proof.Say($"| COPY into a table like it, same key: the floor | {(long)rows * Signals / floor:N0} | 1.00 |");
            proof.Say($"| import: read, check, store, mark days, commit every 50,000 | {(long)rows * Signals / seconds:N0} | {floor / seconds:0.00} |");
            proof.Say($"| the same file again: nothing changes | {(long)rows * Signals / again:N0} | |");
            proof.Say("");
            proof.Say($"Stored {first.GetProperty("accepted").GetInt64():N0}, in the table {stored:N0}; the second time {second.GetProperty("accepted").GetInt64():N0} stored, {second.GetProperty("repeated").GetInt64():N0} repeated, in the table {await CountAsync(database):N0}.");
            proof.Say($"Peak memory of the service process after the first import (evaluation of the days went on beside it): {memory / 1024:N0} MB.");
            proof.Write(Seed);
            return 0;
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static void WriteHistory(string path, DateTimeOffset start, int rows)
    {
        // Two days of a line of the demo plant are written once and their rows are repeated with new times and noise: what counts here is the size and the shape.
        string[] lines = DemoHistory(start, start.AddDays(2)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        var noise = new Noise(Seed);
        using var text = new StreamWriter(path);
        text.WriteLine(lines[0].TrimEnd());
        for (int row = 0; row < rows; row++)
        {
            string[] cells = lines[1 + (row % (lines.Length - 1))].TrimEnd().Split(',');
            text.Write(start.AddMinutes(row).UtcDateTime.ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture));
            foreach (string cell in cells.Skip(1)) text.Write(string.Create(CultureInfo.InvariantCulture, $",{double.Parse(cell, CultureInfo.InvariantCulture) * (1 + (1e-4 * noise.Next())):0.####}"));
            text.WriteLine();
        }
    }

    /// <summary>The instruments of the demo's north line as a wide table.</summary>
    internal static string DemoHistory(DateTimeOffset start, DateTimeOffset end)
    {
        IReadOnlyList<LineReadings> lines = DemoPlant.Readings(PlantFileReader.Read(DemoPlant.PlantFile(start, "north")).Site!, start);
        foreach (LineReadings line in lines) line.Simulation.RunTo(end);
        using StringWriter wide = new(), marked = new();
        HistoryWriter.Write(wide, marked, lines, start, end);
        return wide.ToString();
    }

    private static async Task<double> CopyAsync(NpgsqlDataSource database, DateTimeOffset start, int rows, bool withKey)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync();
        await using (var create = new NpgsqlCommand($"DROP TABLE IF EXISTS floor_reading; CREATE TABLE floor_reading (LIKE reading {(withKey ? "INCLUDING INDEXES" : "")})", connection)) await create.ExecuteNonQueryAsync();
        var noise = new Noise(Seed);
        double[] values = [.. Enumerable.Range(0, 4096).Select(_ => noise.Next())];
        long began = Stopwatch.GetTimestamp();
        using (NpgsqlBinaryImporter copy = connection.BeginBinaryImport("COPY floor_reading (line_id, signal_id, at, value, quality) FROM STDIN (FORMAT BINARY)"))
        {
            for (int row = 0; row < rows; row++)
            {
                DateTime at = start.AddMinutes(row).UtcDateTime;
                for (int signal = 0; signal < Signals; signal++)
                {
                    copy.StartRow();
                    copy.Write(1, NpgsqlDbType.Integer);
                    copy.Write(signal, NpgsqlDbType.Integer);
                    copy.Write(at, NpgsqlDbType.TimestampTz);
                    copy.Write(values[(row + signal) & 4095], NpgsqlDbType.Double);
                    copy.Write((short)0, NpgsqlDbType.Smallint);
                }
            }

            copy.Complete();
        }

        double seconds = Stopwatch.GetElapsedTime(began).TotalSeconds;
        await using var drop = new NpgsqlCommand("DROP TABLE floor_reading", connection);
        await drop.ExecuteNonQueryAsync();
        return seconds;
    }

    private static async Task<(double Seconds, JsonElement Import)> ImportAsync(HttpClient http, string file)
    {
        using var body = new StreamContent(File.OpenRead(file));
        body.Headers.ContentType = new MediaTypeHeaderValue("text/csv");
        using HttpResponseMessage answer = await http.PostAsync(new Uri("/api/v1/imports?name=history.csv", UriKind.Relative), body);
        answer.EnsureSuccessStatusCode();
        string id = JsonDocument.Parse(await answer.Content.ReadAsStringAsync()).RootElement.GetProperty("id").GetString()!;
        for (int poll = 0; poll < 6000; poll++)
        {
            JsonElement import = JsonDocument.Parse(await http.GetStringAsync(new Uri("/api/v1/imports/" + id, UriKind.Relative))).RootElement;
            if (import.GetProperty("state").GetString() == "done")
                return ((import.GetProperty("ended_at").GetDateTimeOffset() - import.GetProperty("started_at").GetDateTimeOffset()).TotalSeconds, import);
            await Task.Delay(100);
        }

        throw new TimeoutException("The import did not end within 10 minutes.");
    }

    private static async Task<long> CountAsync(NpgsqlDataSource database)
    {
        await using NpgsqlCommand count = database.CreateCommand("SELECT count(*) FROM reading");
        return (long)(await count.ExecuteScalarAsync())!;
    }
}
