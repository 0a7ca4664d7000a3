using System.IO.Compression;
using System.Net.Http.Headers;
using System.Net.Http.Json;
using System.Text.Json;
using System.Threading.Channels;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Simulator;

namespace EvapMonitor.Service.Commands.Demo;

/// <summary>
/// Makes the demo's past and imports it through the service's own interface, newest first, so that the pages soon show the present. While one piece is imported
/// the next is made.
/// </summary>
internal sealed class DemoHistory(HttpClient http, string folder, DemoRecord record, IReadOnlyList<LineReadings> lines)
{
    private const string FilePrefix = "fennholm-";

    private static readonly TimeSpan First = TimeSpan.FromDays(2), Others = TimeSpan.FromDays(8);
    private static readonly JsonSerializerOptions Json = new() { PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower };

    /// <summary>Fills everything that is missing up to an instant.</summary>
    /// <exception cref="InvalidOperationException">An import failed.</exception>
    public async Task FillAsync(DateTimeOffset end, CancellationToken stop)
    {
        foreach (string left in Directory.GetFiles(folder, FilePrefix + "*.csv.gz")) File.Delete(left);
        var made = Channel.CreateBounded<(TimeSpanOfHistory Span, string[] Files)>(1);
        using var together = CancellationTokenSource.CreateLinkedTokenSource(stop);
        Task making = Task.Run(() => MakeAsync(Pieces(record.Missing(end)), made.Writer, together.Token), CancellationToken.None);
        try
        {
            await foreach ((TimeSpanOfHistory span, string[] files) in made.Reader.ReadAllAsync(together.Token))
            {
                await Task.WhenAll(files.Select(file => ImportAsync(file, together.Token)));
                record.Done(span);
                foreach (string file in files) File.Delete(file);
            }
        }
        finally
        {
            await together.CancelAsync();
            await making.ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }
    }

    /// <summary>The pieces, newest first: a short one, so that there is soon something to see, then longer ones.</summary>
    internal static IEnumerable<TimeSpanOfHistory> Pieces(IReadOnlyList<TimeSpanOfHistory> missing)
    {
        TimeSpan length = First;
        foreach ((DateTimeOffset from, DateTimeOffset to) in missing.Reverse())
        {
            for (DateTimeOffset end = to; end > from;)
            {
                DateTimeOffset begin = end - from > length ? end - length : from;
                yield return new(begin, end);
                (end, length) = (begin, Others);
            }
        }
    }

    private async Task MakeAsync(IEnumerable<TimeSpanOfHistory> pieces, ChannelWriter<(TimeSpanOfHistory, string[])> made, CancellationToken stop)
    {
        try
        {
            foreach (TimeSpanOfHistory span in pieces) await made.WriteAsync((span, Make(span)), stop);
            made.Complete();
        }
        catch (Exception error) when (error is OperationCanceledException or IOException)
        {
            made.Complete(error);
        }
    }

    private string[] Make(TimeSpanOfHistory span)
    {
        string name = Path.Combine(folder, $"{FilePrefix}{span.From:yyyyMMdd-HHmm}");
        string[] files = [name + "-instruments.csv.gz", name + "-others.csv.gz"];
        using StreamWriter wide = Packed(files[0]), marked = Packed(files[1]);
        HistoryWriter.Write(wide, marked, lines, span.From, span.To);
        return files;
    }

    private static StreamWriter Packed(string file) => new(new GZipStream(File.Create(file), CompressionLevel.Fastest), bufferSize: 1 << 16);

    private async Task ImportAsync(string file, CancellationToken stop)
    {
        using var body = new StreamContent(File.OpenRead(file));
        body.Headers.ContentType = new MediaTypeHeaderValue("application/gzip");
        using HttpResponseMessage answer = await http.PostAsync(new Uri($"/api/v1/imports?name={Path.GetFileName(file)}", UriKind.Relative), body, stop);
        if (!answer.IsSuccessStatusCode) throw new InvalidOperationException($"{Path.GetFileName(file)}: {await answer.Content.ReadAsStringAsync(stop)}");
        ImportWire import = (await answer.Content.ReadFromJsonAsync<ImportWire>(Json, stop))!;
        while (import.State is "waiting" or "running")
        {
            await Task.Delay(TimeSpan.FromMilliseconds(100), stop);
            import = (await http.GetFromJsonAsync<ImportWire>(new Uri($"/api/v1/imports/{import.Id}", UriKind.Relative), Json, stop))!;
        }

        if (import.State != "done") throw new InvalidOperationException($"{Path.GetFileName(file)}: the import ended as {import.State}. {import.Error}");
    }
}
