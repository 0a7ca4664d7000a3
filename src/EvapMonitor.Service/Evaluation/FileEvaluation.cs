using System.Globalization;
using EvapMonitor.Core;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Store;
using NodaTime;

namespace EvapMonitor.Service.Evaluation;

/// <summary>
/// Evaluates readings of files without a database. The days are computed one by one with the same lead-in as in the service, so that both give the same numbers.
/// </summary>
internal sealed class FileEvaluation(Site site, CancellationToken stop) : IReadingSink
{
    private const int MostTold = 100;

    private readonly Dictionary<string, int> _keys = PlantInForce.SignalsOf(site).Select((signal, i) => (signal.Signal, i)).ToDictionary(pair => pair.Signal, pair => pair.i);
    private readonly Dictionary<string, ReadingSeries> _series = PlantInForce.SignalsOf(site).ToDictionary(signal => signal.Signal, _ => new ReadingSeries());
    private readonly List<string> _told = [];
    private readonly Dictionary<string, long> _unknown = [];
    private ReadingSeries[] _byKey = [];
    private string _file = "";
    private List<LoggedEvent> _events = [];
    private long _accepted;
    private long _repeated;

    /// <summary>Rows or cells that could not be used.</summary>
    public long Rejected { get; private set; }

    /// <summary>The first hundred problems, each in one line, and the signals that the plant does not name.</summary>
    public IEnumerable<string> Told => _told.Concat(_unknown.OrderByDescending(pair => pair.Value).Take(20).Select(pair => $"{pair.Key}: {pair.Value} readings, but the plant file names no such signal"));

    /// <summary>What was read and written, in one line.</summary>
    public string Summary { get; private set; } = "";

    /// <summary>Reads one file.</summary>
    public void Read(string path)
    {
        _byKey = [.. _series.Values];
        _file = Path.GetFileName(path);
        using FileStream stream = File.OpenRead(path);
        long earliest = site.HistoryFrom.ToUnixTimeMilliseconds();
        try
        {
            new ReadingFile(stream, DateTimeZoneProviders.Tzdb[site.TimeZone], earliest, long.MaxValue, this).Read();
        }
        catch (Exception error) when (error is ReadingFileException or InvalidDataException)
        {
            throw new StartException([$"{_file}: {error.Message}"]);
        }
    }

    /// <summary>Reads logged events.</summary>
    public void ReadEvents(string path) => _events = EventFile.Read(path, site);

    /// <summary>Evaluates and writes, window by window, the coefficients and the balance.</summary>
    public void Write(string folder)
    {
        string path = Path.Combine(folder, "coefficients.csv");
        using var writer = new CoefficientFile(path);
        using var balances = new BalanceFile(Path.Combine(folder, "balance.csv"));
        balances.WriteHeader();
        using var campaigns = new CampaignFile(Path.Combine(folder, "campaigns.csv"));
        var compared = new List<CleanComparisonResult>();
        foreach (Line line in site.Lines)
        {
            var evaluation = new LineEvaluation(site, line);
            var own = evaluation.Signals.Select(signal => _series[signal]).Where(series => series.Count > 0).ToList();
            if (own.Count == 0) continue;
            LineLog log = LogOf(line);
            var hours = new LineHours(line, (long)site.Window.TotalMilliseconds);
            long last = own.Max(series => series.At[^1]);
            for (long day = Milliseconds.DayOf(own.Min(series => series.At[0])); day <= last; day += Milliseconds.Day)
            {
                stop.ThrowIfCancellationRequested();
                LineWindow[] windows = evaluation.Evaluate(_series, day, long.Min(day + Milliseconds.Day, EndOfWindow(last)), log);
                hours.Add(windows);
                foreach (LineWindow window in windows)
                {
                    writer.Write(line, window);
                    if (window.Balance is { } balance) balances.Write(line.Name, window.At, balance);
                }
            }

            IReadOnlyList<Surface> surfaces = LineSurfaces.Of(hours.Records(_events));
            compared.AddRange(hours.Compare(surfaces));
            campaigns.Write(line.Name, surfaces);
        }

        writer.Complete(compared);

        Summary = string.Create(CultureInfo.InvariantCulture, $"{_accepted} readings used, {_repeated} repeated, {Rejected} rejected, {_unknown.Values.Sum()} of unknown signals; {writer.Rows} rows in {path}, {balances.Rows} in balance.csv, {campaigns.Rows} in campaigns.csv");
    }

    /// <inheritdoc/>
    public int KeyOf(string signal) => _keys.GetValueOrDefault(signal, -1);

    /// <inheritdoc/>
    public void Take(int key, in Reading reading)
    {
        if (_byKey[key].Add(reading)) _accepted++;
        else _repeated++;
    }

    /// <inheritdoc/>
    public void TakeUnknown(string signal)
    {
        if (_unknown.Count < 10_000 || _unknown.ContainsKey(signal)) _unknown[signal] = _unknown.GetValueOrDefault(signal) + 1;
    }

    /// <inheritdoc/>
    public void Reject(long line, string reason)
    {
        Rejected++;
        if (_told.Count < MostTold) _told.Add($"{_file}:{line}: {reason}");
    }

    /// <inheritdoc/>
    public bool RowDone(long line)
    {
        stop.ThrowIfCancellationRequested();
        return true;
    }

    private LineLog LogOf(Line line)
    {
        IEnumerable<LoggedEvent> its = _events.Where(one => one.Line == line.Name);
        return new LineLog(
            its.Where(one => one.Kind == EventFile.Cleaning).ToLookup(one => one.Effect!, one => (one.Start, one.End ?? long.MaxValue)),
            its.Where(one => one.Kind == InstrumentLogStore.Excluded).ToLookup(one => one.Signal!, one => (one.Start, one.End ?? long.MaxValue)));
    }

    private long EndOfWindow(long at)
    {
        long step = (long)site.Window.TotalMilliseconds;
        return at - Milliseconds.Modulo(at, step) + step;
    }
}
