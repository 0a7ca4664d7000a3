using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <content>Clean expectations, and the hours held against them.</content>
internal sealed partial class CampaignWalk
{
    /// <summary>Hours older than this are not learnt from, ms: a plant changes, and a year holds its seasons.</summary>
    private const long Memory = 366 * Milliseconds.Day;

    /// <summary>Slopes are learnt anew when the hours have grown by this share: more often they would move by less than their uncertainty.</summary>
    private const double Growth = 0.1;

    private readonly double[] _share;
    private readonly int[] _sharedBy;
    private readonly CleanHour[] _results;
    private readonly List<CleanReference> _references = [];
    private readonly Dictionary<SurfaceUse, (int Limit, ConditionSlopes Slopes)> _learnt = [];

    /// <summary>The open campaign goes on to a limit.</summary>
    private void Extend(int limit)
    {
        OpenCampaign campaign = _campaigns[^1];
        int index = _campaigns.Count - 1, from = int.Max(campaign.Limit, campaign.From);
        campaign.Limit = int.Max(limit, campaign.From);
        long next = Array.Find(_recalibrations, at => at > campaign.Start);
        if (campaign.Sample(_table, _settled, next == 0 ? long.MaxValue : next))
        {
            // More is known of its beginning: what was said of these days is said anew.
            campaign.Links.Clear();
            foreach (((SurfaceUse use, long since), int at) in campaign.References) _references[at] = Make(index, use, since, campaign.Slopes[use]);
            from = campaign.From;
            LookBack(index);
        }

        for (int i = from; i < campaign.Limit; i++) HoldAgainst(i, index);
        if (campaign.StartedBy != CleaningSource.FirstData) CarryOver(index);
    }

    private void HoldAgainst(int hour, int index)
    {
        CleanReference reference = ReferenceOf(index, _table.Use[hour], hour);
        CleanComparisonResult one = reference.Compare(_hours[hour].Coefficient, SurfaceConditions.From(_table.ConditionsOf(hour)));
        int at = _campaigns[index].References[(_table.Use[hour], reference.From)];
        _results[hour] = new CleanHour(_table.At[hour], index, at, one.CleanCoefficient, one.Cleanliness, one.Resistance, one.AtReference, one.Clamped);
        if (IsLearnt(reference)) Share(hour, one.Cleanliness.Value, index);
    }

    private void Share(int hour, double cleanliness, int by)
    {
        _share[hour] = double.Clamp(cleanliness, 0.3, 1.1);
        _sharedBy[hour] = by;
    }

    private static bool IsLearnt(CleanReference reference) => reference.Basis is ReferenceBasis.Level or ReferenceBasis.Conditions;

    /// <summary>The expectation of a campaign at one of its hours.</summary>
    private CleanReference ReferenceOf(int index, SurfaceUse use, int hour)
    {
        OpenCampaign campaign = _campaigns[index];
        long recalibrated = hour < _table.Count ? Baseline(_table.At[hour]) : Baseline(campaign.Start), since = long.Max(campaign.Start, recalibrated);
        if (campaign.References.TryGetValue((use, since), out int at)) return _references[at];
        if (!campaign.Slopes.TryGetValue(use, out ConditionSlopes? slopes))
        {
            slopes = Slopes(use, campaign.From);
            campaign.Slopes[use] = slopes;
        }

        campaign.References[(use, since)] = _references.Count;
        _references.Add(Make(index, use, since, slopes));
        return _references[^1];
    }

    /// <summary>The expectation by which an interruption is judged: that of the campaign, with slopes of the hours since where there were none before.</summary>
    private CleanReference Expectation(SurfaceUse use, Interruption interruption)
    {
        int before = _table.FirstFrom(interruption.Start - Milliseconds.Hour + 1), index = _campaigns.Count - 1;
        if (_campaigns[index].Slopes.TryGetValue(use, out ConditionSlopes? known) && known.Enough) return ReferenceOf(index, use, int.Max(before - 1, 0));
        return Make(index, use, long.Max(_campaigns[index].Start, Baseline(interruption.Start)), Slopes(use, before));
    }

    private ConditionSlopes Slopes(SurfaceUse use, int limit)
    {
        bool known = _learnt.TryGetValue(use, out (int Limit, ConditionSlopes Slopes) last);
        int from = limit > 0 ? _table.FirstFrom(_table.At[limit - 1] - Memory) : 0;
        if (known && last.Limit <= limit && limit - last.Limit <= Growth * (limit - from)) return last.Slopes;
        ConditionSlopes slopes = ConditionSlopes.Learn(_table, use, from, limit, _segment, _settled, _share);
        if (!known || last.Limit <= limit) _learnt[use] = (limit, slopes);
        return slopes;
    }

    private CleanReference Make(int index, SurfaceUse use, long since, ConditionSlopes slopes)
    {
        CleanReference frame = Frame(index, use, since, slopes);
        long baseline = Baseline(since);
        LevelSample[] samples = [.. _campaigns.Take(index + 1).Where(campaign => campaign.Start >= baseline)
            .Select(campaign => campaign.Samples.GetValueOrDefault(use)).OfType<LevelSample>().Where(sample => sample.Hours.Length >= LevelSample.Fewest).TakeLast(int.Max(_settings.BestOf, 1))];
        if (samples.Length == 0) samples = [.. _campaigns.Take(index + 1).Where(campaign => campaign.Start >= baseline).Select(campaign => campaign.Links.GetValueOrDefault(use)).OfType<LevelSample>().TakeLast(int.Max(_settings.BestOf, 1))];
        if (CleanLevels.Combine(frame, _table, samples, slopes) is { } combined) return combined;
        string why = baseline > long.MinValue && baseline > _campaigns[0].Start ? $"an instrument was recalibrated, or the surface changed, on {CleanLevels.Day(baseline)} and no cleaning with this product has followed"
            : _campaigns.Take(index + 1).Any(campaign => campaign.StartedBy != CleaningSource.FirstData) ? "too few hours with this product after a cleaning"
            : "no cleaning was seen yet";
        return _settings.DesignCoefficient is > 0 and { } design
            ? frame with { Basis = ReferenceBasis.Design, Level = double.Log(design), LevelUncertainty = 0, Source = $"design value, whose uncertainty is not known; {why}" }
            : frame with { Source = $"none: {why}, and no design value is given" };
    }

    private static CleanReference Frame(int index, SurfaceUse use, long since, ConditionSlopes slopes)
    {
        double[] covariance = new double[SurfaceTable.Terms * SurfaceTable.Terms];
        for (int k = 0; k < covariance.Length; k++) covariance[k] = slopes.Covariance[k / SurfaceTable.Terms, k % SurfaceTable.Terms];
        return new CleanReference
        {
            Campaign = index,
            Effect = use.Effect,
            Product = use.Product,
            From = since,
            Basis = ReferenceBasis.None,
            Source = "",
            Level = double.NaN,
            LevelUncertainty = double.NaN,
            Slopes = slopes.Slopes,
            SlopeCovariance = covariance,
            Learnt = slopes.Learnt,
            At = new SurfaceConditions(double.NaN, double.NaN, double.NaN),
            Lowest = SurfaceConditions.From(slopes.Lowest),
            Highest = SurfaceConditions.From(slopes.Highest),
            HourScatter = slopes.Noise.Learnt ? slopes.Noise.Sigma : 0,
            SlowShare = slopes.Noise.SlowShare,
        };
    }
}
