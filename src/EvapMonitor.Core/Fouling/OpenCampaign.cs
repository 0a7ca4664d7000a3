namespace EvapMonitor.Core.Fouling;

/// <summary>A campaign as far as it is known.</summary>
internal sealed class OpenCampaign(long start, int from, double origin, CleaningSource startedBy, double confidence)
{
    public long Start { get; } = start;

    /// <summary>Its first hour.</summary>
    public int From { get; } = from;

    /// <summary>Hours of service at its start.</summary>
    public double Origin { get; } = origin;

    public CleaningSource StartedBy { get; } = startedBy;

    public double Confidence { get; } = confidence;

    public double RemovedShare { get; set; } = double.NaN;

    public bool DidNotClean { get; set; }

    public long? End { get; set; }

    /// <summary>First hour that is not of it, as far as is known.</summary>
    public int Limit { get; set; }

    /// <summary>The slopes of each use, learnt from what was before it.</summary>
    public Dictionary<SurfaceUse, ConditionSlopes> Slopes { get; } = [];

    /// <summary>The first hours after its start, by use.</summary>
    public Dictionary<SurfaceUse, LevelSample> Samples { get; private set; } = [];

    /// <summary>The first hours of products that followed another, by use.</summary>
    public Dictionary<SurfaceUse, LevelSample> Links { get; } = [];

    /// <summary>Its clean expectations: where they stand in the list.</summary>
    public Dictionary<(SurfaceUse Use, long From), int> References { get; } = [];

    /// <summary>Takes the first hours after its start as far as they are known; true when there are more than before.</summary>
    public bool Sample(SurfaceTable table, bool[] settled, long recalibrated)
    {
        if (StartedBy == CleaningSource.FirstData) return false;
        int had = Samples.Values.Sum(sample => sample.Hours.Length);
        if (had >= LevelSample.Most) return false;
        long start = From < table.Count ? table.At[From] : Start;
        int[] hours = [.. Enumerable.Range(From, Limit - From).Where(i => settled[i] && table.At[i] < start + LevelSample.Within && table.At[i] < recalibrated).Take(LevelSample.Most)];
        if (hours.Length == had) return false;
        Samples = hours.GroupBy(i => table.Use[i]).ToDictionary(group => group.Key, group => new LevelSample(Start, [.. group], Origin));
        return true;
    }
}
