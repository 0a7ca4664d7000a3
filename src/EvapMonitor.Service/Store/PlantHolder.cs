namespace EvapMonitor.Service.Store;

/// <summary>Holds the plant for all that need it. Set once before anything else starts, and again when a revision is accepted.</summary>
public sealed class PlantHolder(TimeProvider clock)
{
    private readonly Lock _gate = new();
    private volatile PlantTimeline? _timeline;

    /// <summary>Which revision is in force when. An older one than is held is not taken: two may be loaded at the same time.</summary>
    /// <exception cref="InvalidOperationException">None was set yet.</exception>
    public PlantTimeline Timeline
    {
        get => _timeline ?? throw new InvalidOperationException("No plant file has been accepted yet.");
        set
        {
            lock (_gate)
            {
                if (_timeline is null || value.Newest >= _timeline.Newest) _timeline = value;
            }
        }
    }

    /// <summary>The plant in force now: under it today is computed, and it is what pages show.</summary>
    public PlantInForce Current
    {
        get
        {
            DateTime today = clock.GetUtcNow().UtcDateTime.Date;
            return Timeline.At(new DateTimeOffset(today, TimeSpan.Zero));
        }
    }
}
