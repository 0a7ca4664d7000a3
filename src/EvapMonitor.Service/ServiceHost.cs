using System.Globalization;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Service.Security;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Authentication;
using Npgsql;
using Serilog;
using Serilog.Events;

namespace EvapMonitor.Service;

/// <summary>The service could not start for a reason that its operator can mend; the message has one line for each.</summary>
public sealed class StartException(IReadOnlyList<string> problems) : Exception(string.Join(Environment.NewLine, problems))
{
    /// <summary>What is wrong, each in one line.</summary>
    public IReadOnlyList<string> Problems { get; } = problems;
}

/// <summary>The service as a whole: data folder, database, plant, web server. Made in this order, undone in the reverse.</summary>
public sealed class ServiceHost : IAsyncDisposable
{
    private readonly FileStream _lock;
    private readonly PrivateServer? _server;
    private readonly NpgsqlDataSource _database;
    private readonly WebApplication _app;

    private ServiceHost(FileStream folderLock, PrivateServer? server, NpgsqlDataSource database, WebApplication app)
    {
        (_lock, _server, _database, _app) = (folderLock, server, database, app);
    }

    /// <summary>The services, for the command line and tests.</summary>
    public IServiceProvider Services => _app.Services;

    /// <summary>The address at which it listens.</summary>
    public string Address => _app.Urls.First();

    /// <summary>Starts everything.</summary>
    /// <exception cref="StartException">Options, plant file or database are not usable.</exception>
    public static async Task<ServiceHost> StartAsync(ServiceOptions options, CancellationToken stop, TimeProvider? clock = null, LogEventLevel logLevel = LogEventLevel.Information)
    {
        IReadOnlyList<string> problems = options.Problems();
        if (problems.Count > 0) throw new StartException(problems);
        (Core.Plant.Site Site, string Text)? plant = options.Plant is null ? null : ReadPlant(options.Plant, await File.ReadAllTextAsync(options.Plant, stop));

        FileStream folderLock = LockFolder(options.Data);
        PrivateServer? server = null;
        NpgsqlDataSource? database = null;
        WebApplication? app = null;
        try
        {
            try
            {
                if (options.Connection is null) server = await PrivateServer.StartAsync(options.Data, stop);
                string connection = options.Connection ?? server!.Connection;
                IReadOnlyList<string> scripts = Schema.Upgrade(connection);
                database = NpgsqlDataSource.Create(connection);
                app = Build(options, database, clock ?? TimeProvider.System, logLevel, server);
                if (scripts.Count > 0) app.Logger.SchemaUpgraded(string.Join(", ", scripts));
                app.Services.GetRequiredService<PlantHolder>().Timeline = await AcceptAsync(app, plant, stop);
                await app.Services.GetRequiredService<RecomputationStore>().StartForModelAsync(Environment.UserName, stop);
                await app.StartAsync(stop);
                var host = new ServiceHost(folderLock, server, database, app);
                PlantInForce inForce = app.Services.GetRequiredService<PlantHolder>().Current;
                app.Logger.Serving(inForce.Site.Name, inForce.RevisionId, host.Address);
                return host;
            }
            catch (Exception error) when (error is InvalidOperationException or NpgsqlException or IOException)
            {
                throw new StartException([error.Message]);
            }
        }
        catch
        {
            if (app is not null) await app.DisposeAsync();
            if (database is not null) await database.DisposeAsync();
            if (server is not null) await server.StopAsync();
            await folderLock.DisposeAsync();
            throw;
        }
    }

    /// <summary>Runs until the process is told to stop.</summary>
    public Task WaitAsync(CancellationToken stop) => _app.WaitForShutdownAsync(stop);

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        using (var limit = new CancellationTokenSource(TimeSpan.FromSeconds(20))) await _app.StopAsync(limit.Token);
        await _app.DisposeAsync();
        await _database.DisposeAsync();
        if (_server is not null) await _server.StopAsync();
        await _lock.DisposeAsync();
    }

    private static WebApplication Build(ServiceOptions options, NpgsqlDataSource database, TimeProvider clock, LogEventLevel logLevel, PrivateServer? server)
    {
        WebApplicationBuilder builder = WebApplication.CreateSlimBuilder(new WebApplicationOptions
        {
            ContentRootPath = AppContext.BaseDirectory,
            WebRootPath = Path.Combine(AppContext.BaseDirectory, "wwwroot"),
        });
        builder.Logging.ClearProviders();
        builder.Services.AddSerilog(log => log
            .MinimumLevel.Is(logLevel)
            .MinimumLevel.Override("Microsoft", LogEventLevel.Warning)
            // It warns of keys that nothing here uses.
            .MinimumLevel.Override("Microsoft.AspNetCore.DataProtection", LogEventLevel.Error)
            .WriteTo.Console(formatProvider: CultureInfo.InvariantCulture, outputTemplate: "{Timestamp:yyyy-MM-dd HH:mm:ss} {Level:u3} {Message:lj}{NewLine}{Exception}"));
        builder.WebHost.UseUrls(options.Listen).UseKestrelHttpsConfiguration().ConfigureKestrel(kestrel =>
        {
            kestrel.AddServerHeader = false;
            kestrel.Limits.MaxRequestBodySize = ServiceParts.LargestBody;
        });
        builder.Services.AddSingleton(new TrustedPeers(options.InContainer));
        builder.Services.AddSingleton(clock);
        builder.Services.AddSingleton(database);
        if (server is not null) builder.Services.AddSingleton(server).AddHostedService<PrivateServerGuard>();
        builder.Services.AddSingleton(new Uploads(Path.Combine(options.Data, "uploads")));
        builder.Services.AddStore().AddEvaluation().AddIngest(options.Ingest.Plan(options.Data, out _)).AddApi();
        WebApplication app = builder.Build();
        app.UseExceptionHandler();
        app.UseStatusCodePages();
        app.UseMiddleware<BrowserGuard>();
        app.UseDashboard();
        app.UseAuthentication();
        app.UseAuthorization();
        app.MapEvapMonitor();
        app.MapDashboard();
        return app;
    }

    private static (Core.Plant.Site Site, string Text) ReadPlant(string path, string text)
    {
        PlantFileResult result = PlantFileReader.Read(text);
        return result.Site is { } site ? (site, text) : throw new StartException([.. result.Problems.Select(problem => problem.ToLine(Path.GetFileName(path)))]);
    }

    private static async Task<PlantTimeline> AcceptAsync(WebApplication app, (Core.Plant.Site Site, string Text)? given, CancellationToken stop)
    {
        PlantStore store = app.Services.GetRequiredService<PlantStore>();
        int? accepted = given is var (site, text) ? await store.AcceptAtStartAsync(site, text, Environment.UserName, stop) : null;
        PlantTimeline timeline = await store.LoadAsync(null, stop)
            ?? throw new StartException(["No plant file was accepted before; give one: evapmonitor run PLANT (docs/plant-file.md says how to write it)."]);
        PlantInForce now = timeline.At(app.Services.GetRequiredService<TimeProvider>().GetUtcNow());
        if (accepted is { } revision && revision != now.RevisionId) app.Logger.EarlierPlantGiven(revision, now.RevisionId);
        return timeline;
    }

    private static FileStream LockFolder(string folder)
    {
        try
        {
            Directory.CreateDirectory(folder);
            return new FileStream(Path.Combine(folder, "service.lock"), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new StartException([$"The data folder {folder} cannot be used: {error.Message} (is another evapmonitor running on it?)"]);
        }
    }
}
