using EvapMonitor.Service.Live;

namespace EvapMonitor.Service.Tests.Live;

public class LiveEventsTests
{
    [Fact]
    public void PageThatComesBack_GetsWhatItMissed()
    {
        var events = new LiveEvents();
        using LiveEvents.Listening first = events.Listen()!;
        events.Publish("windows", 1);
        events.Publish("windows", 2);
        Assert.True(first.Reader.TryRead(out LiveEvent? seen));
        events.Publish("import", 3);
        using LiveEvents.Listening back = events.Listen(seen!.Id)!;
        Assert.False(back.MustReset);
        Assert.Equal([2, 3], Bodies(back));
    }

    [Theory]
    [InlineData("another-1")]
    [InlineData("nonsense")]
    public void PageOfAnotherRun_IsToldToFetchAnew(string lastId)
    {
        var events = new LiveEvents();
        events.Publish("windows", 1);
        using LiveEvents.Listening back = events.Listen(lastId)!;
        Assert.True(back.MustReset);
        Assert.Empty(Bodies(back));
    }

    [Fact]
    public void PageThatWasAwayTooLong_IsToldToFetchAnew()
    {
        var events = new LiveEvents();
        using LiveEvents.Listening first = events.Listen()!;
        events.Publish("windows", 0);
        Assert.True(first.Reader.TryRead(out LiveEvent? seen));
        for (int i = 0; i < LiveEvents.MostKept; i++) events.Publish("windows", i);
        using (LiveEvents.Listening back = events.Listen(seen!.Id)!) Assert.False(back.MustReset);
        events.Publish("windows", -1);
        using (LiveEvents.Listening back = events.Listen(seen.Id)!) Assert.True(back.MustReset);
    }

    private static List<int> Bodies(LiveEvents.Listening listening)
    {
        var bodies = new List<int>();
        while (listening.Reader.TryRead(out LiveEvent? happened)) bodies.Add((int)happened.Body);
        return bodies;
    }
}
