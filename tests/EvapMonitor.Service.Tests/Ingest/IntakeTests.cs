using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Spool;
using EvapMonitor.Service.Live;
using Microsoft.Extensions.Logging.Abstractions;

namespace EvapMonitor.Service.Tests.Ingest;

public sealed class IntakeTests : IDisposable
{
    private static readonly long Now = TimeProvider.System.GetUtcNow().ToUnixTimeMilliseconds();

    private readonly string _folder = Directory.CreateTempSubdirectory("evapmonitor-intake-").FullName;
    private readonly Notices _notices = new(TimeProvider.System);
    private readonly UnknownSignals _unknown = new();
    private readonly SourceState _source = new("gateway", "mqtt", "broker.example:1883");

    [Fact]
    public async Task Answered_MeansInTheSpool()
    {
        using Intake intake = Open();
        IntakeAnswer answer = await intake.KeepAsync(_source, Readings(3));
        Assert.Equal(new IntakeAnswer(3, 0, 0, null), answer);
        SpoolPortion portion = intake.Read(0, 100);
        Assert.Equal(Readings(3), Assert.Single(portion.Batches).Readings);
        Assert.Equal("gateway", portion.Batches[0].Source);
        Assert.Equal(3, _source.Accepted);
    }

    [Fact]
    public async Task Answers_ComeInTheOrderOfArrival()
    {
        using Intake intake = Open();
        var tasks = Enumerable.Range(0, 2_000).Select(i => intake.KeepAsync(_source, Readings(1, i))).ToList();
        for (int i = 0; i < tasks.Count; i += 97)
        {
            // Whoever is answered, all that came before are in the spool.
            await tasks[i];
            Assert.InRange(intake.Read(0, int.MaxValue).Readings, i + 1, tasks.Count);
        }

        List<long> stored = [.. intake.Read(0, int.MaxValue).Batches.SelectMany(batch => batch.Readings).Select(reading => reading.Reading.At)];
        Assert.Equal(Enumerable.Range(0, 2_000).Select(i => Now + i), stored);
    }

    [Fact]
    public async Task ManySubmissions_ShareACommit()
    {
        using Intake intake = Open();
        await Task.WhenAll(Enumerable.Range(0, 5_000).Select(i => intake.KeepAsync(_source, Readings(1, i))));
        Assert.InRange(intake.Read(0, int.MaxValue).LastId, 5_000 / Intake.BatchReadings, 200);
    }

    [Fact]
    public async Task SpoolFull_IsRefusedAndNoticed_AndTakenAgainWhenThereIsRoom()
    {
        using Intake intake = Open(quota: 20_000);
        IntakeAnswer answer = default;
        int kept = 0;
        for (int i = 0; i < 100 && answer.Refusal is null; i++)
        {
            answer = await intake.KeepAsync(_source, Readings(100, i * 1000), alone: true);
            if (answer.Refusal is null) kept += answer.Accepted;
        }

        Assert.Contains("The spool is full", answer.Refusal, StringComparison.Ordinal);
        Assert.Equal(0, answer.Accepted);
        Assert.Contains(_notices.Standing, notice => notice.Key == "spool-full");
        Assert.Equal(1, _source.Refused);
        SpoolPortion portion = intake.Read(0, int.MaxValue);
        Assert.Equal(kept, portion.Readings);
        intake.Remove(portion);
        for (int i = 0; i < 100 && intake.Refusal is not null; i++) await Task.Delay(20, TestContext.Current.CancellationToken);
        Assert.Null((await intake.KeepAsync(_source, Readings(100, 900_000))).Refusal);
        Assert.DoesNotContain(_notices.Standing, notice => notice.Key == "spool-full");
    }

    [Fact]
    public async Task DiskBelowTheReserve_IsRefused()
    {
        using Intake intake = Open(reserve: long.MaxValue);
        Assert.Contains("less than the reserve", (await intake.KeepAsync(_source, Readings(1))).Refusal, StringComparison.Ordinal);
        Assert.Equal(0, intake.Read(0, 100).LastId);
    }

    [Fact]
    public async Task TooManyInMemory_AreRefusedAtOnce()
    {
        using Intake intake = Open();
        var tasks = new List<Task<IntakeAnswer>>();
        for (int i = 0; i < 60; i++) tasks.Add(intake.KeepAsync(_source, Readings(20_000, i * 20_000)));
        IntakeAnswer[] answers = await Task.WhenAll(tasks);
        Assert.Contains(answers, answer => answer.Refusal?.Contains("wait to be written already", StringComparison.Ordinal) == true);
        Assert.Equal(answers.Sum(answer => answer.Accepted), intake.Read(0, int.MaxValue).Readings);
    }

    [Fact]
    public async Task FutureOldAndUnnamed_AreLeftOutAndCounted()
    {
        using Intake intake = Open();
        IncomingReading good = Readings(1)[0];
        IntakeAnswer answer = await intake.KeepAsync(
            _source,
            [
                good, At(Now + (11 * 60_000)), At(Now + (9 * 60_000)), At(new DateTimeOffset(2025, 12, 31, 23, 59, 59, TimeSpan.Zero).ToUnixTimeMilliseconds()),
                good with { Signal = "X.9" }, good with { Signal = "X.9" },
            ]);
        Assert.Equal(new IntakeAnswer(2, 2, 2, null), answer);
        Assert.Equal((2, 2), (_source.OutOfTime, _source.Unknown));
        Assert.Equal(["X.9"], _unknown.All.Select(signal => signal.Name));
        Assert.Equal(2, _unknown.All[0].Count);
        Assert.Contains(_source.Samples, sample => sample.Reason.Contains("ahead of this machine's clock", StringComparison.Ordinal));
        Assert.Contains(_source.Samples, sample => sample.Reason.Contains("history-from", StringComparison.Ordinal));

        IncomingReading At(long at) => good with { Reading = good.Reading with { At = at } };
    }

    [Fact]
    public void UnknownNames_AreKeptApartUpToALimit()
    {
        for (int i = 0; i < UnknownSignals.MostNames + 5; i++) _unknown.Count("name " + i, "s", default);
        _unknown.Count("name 1", "s", default);
        Assert.Equal(UnknownSignals.MostNames, _unknown.All.Count);
        Assert.Equal(5, _unknown.Others);
        Assert.Equal(("name 1", 2), (_unknown.All[0].Name, _unknown.All[0].Count));
    }

    [Fact]
    public async Task Closing_KeepsWhatWasGivenBefore()
    {
        List<Task<IntakeAnswer>> tasks;
        using (Intake intake = Open()) tasks = [.. Enumerable.Range(0, 300).Select(i => intake.KeepAsync(_source, Readings(1, i)))];
        Assert.All(await Task.WhenAll(tasks), answer => Assert.Null(answer.Refusal));
        using Intake again = Open();
        Assert.Equal(300, again.Read(0, int.MaxValue).Readings);
    }

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    private Intake Open(long quota = 1 << 30, long reserve = 0) => new(
        new SpoolSettings(_folder) { Quota = quota, Reserve = reserve }, new Admission(IngestPlant.Holder(), _unknown, TimeProvider.System), _notices, TimeProvider.System,
        NullLogger<Intake>.Instance);

    private static IncomingReading[] Readings(int count, int from = 0) =>
        [.. Enumerable.Range(from, count).Select(i => new IncomingReading("F.1", new Reading(Now + (i % 500_000), i, Quality.Good)))];
}
