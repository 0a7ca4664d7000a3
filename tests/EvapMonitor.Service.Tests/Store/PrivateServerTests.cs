using System.Diagnostics;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using System.Net.Http.Json;

namespace EvapMonitor.Service.Tests.Store;

/// <summary>The program with a database server of its own, through the deaths of either.</summary>
public sealed class PrivateServerTests
{
    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PrivateServerFact]
    public async Task ServerAndProgram_SurviveEachOthersDeath()
    {
        string folder = TemporaryFolder.Create(), plant = Path.Combine(folder, "plant.yaml"), data = Path.Combine(folder, "data");
        await File.WriteAllTextAsync(plant, SmallPlant.Text, Stop);
        try
        {
            await using (ChildService first = await ChildService.RunAsync(plant, data))
            {
                AssertPrivate(data);
                await first.UploadAsync(History.Long(120_000));
                Assert.Equal(120_000, (await first.EndOfImportAsync()).Accepted);

                // The server dies while the program works: it is started again and the work goes on.
                int server = ServerOf(data);
                await first.UploadAsync(History.Long(400_000));
                await Poll.UntilAsync("a running import", async () => (await ImportAsync(first)).State == "running");
                using (Process postgres = Process.GetProcessById(server)) postgres.Kill();
                Assert.Equal((280_000L, 120_000L), Counts(await EndAsync(first)));
                Assert.NotEqual(server, ServerOf(data));
                Assert.Contains("started again", first.Said);
                using (HttpResponseMessage ready = await first.Http.GetAsync("/health/ready", Stop)) Assert.True(ready.IsSuccessStatusCode);
                await first.KillAsync();
            }

            // The program dies: its server lives on, and the next start takes it over.
            int left = ServerOf(data);
            string socket = File.ReadAllLines(PidFile(data))[4];
            Assert.False(HasEnded(left));
            await using (ChildService second = await ChildService.RunAsync(plant, data))
            {
                Assert.Equal(left, ServerOf(data));
                Assert.Equal("done", (await ImportAsync(second)).State);
                Assert.Equal(0, await second.TerminateAsync());
            }

            Assert.Empty(Directory.GetFiles(data, "postmaster.pid", SearchOption.AllDirectories));
            Assert.False(Directory.Exists(socket));
        }
        finally
        {
            StopServerOf(data);
            Directory.Delete(folder, recursive: true);
        }
    }

    private static void AssertPrivate(string data)
    {
        if (OperatingSystem.IsWindows()) return;
        const UnixFileMode ownerAlone = UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute;
        string[] lines = File.ReadAllLines(PidFile(data));
        string socket = lines[4];
        Assert.Equal(ownerAlone, File.GetUnixFileMode(socket));
        Assert.Empty(lines[5].Trim());
        Assert.Equal(ownerAlone, File.GetUnixFileMode(Path.GetDirectoryName(PidFile(data))!));
    }

    private static async Task<ImportWire> ImportAsync(ChildService child) =>
        (await child.Http.GetFromJsonAsync<ImportsWire>("/api/v1/imports", RunningService.Json, Stop))!.Imports[0];

    /// <summary>While the database is away the program answers 503; that is no end.</summary>
    private static Task<ImportWire> EndAsync(ChildService child) => Poll.UntilAsync("the end of the import", async () =>
    {
        using HttpResponseMessage answer = await child.Http.GetAsync("/api/v1/imports", Stop);
        if (answer.StatusCode == System.Net.HttpStatusCode.ServiceUnavailable) return null;
        answer.EnsureSuccessStatusCode();
        ImportWire import = (await answer.Content.ReadFromJsonAsync<ImportsWire>(RunningService.Json, Stop))!.Imports[0];
        return import.State is "waiting" or "running" ? null : import;
    }, 60);

    private static (long Accepted, long Repeated) Counts(ImportWire import)
    {
        Assert.Equal(("done", null), (import.State, import.Error));
        return (import.Accepted, import.Repeated);
    }

    private static string PidFile(string data) => Directory.GetFiles(Path.Combine(data, "postgresql"), "postmaster.pid", SearchOption.AllDirectories).Single();

    private static int ServerOf(string data) => int.Parse(File.ReadLines(PidFile(data)).First());

    private static bool HasEnded(int process)
    {
        try
        {
            using Process found = Process.GetProcessById(process);
            return found.HasExited;
        }
        catch (ArgumentException)
        {
            return true;
        }
    }

    /// <summary>After a failure the server may still run: it is this test's own.</summary>
    private static void StopServerOf(string data)
    {
        if (!Directory.Exists(data) || Directory.GetFiles(data, "postmaster.pid", SearchOption.AllDirectories) is not [var file]) return;
        using Process server = Process.GetProcessById(int.Parse(File.ReadLines(file).First()));
        server.Kill();
        server.WaitForExit();
    }
}
