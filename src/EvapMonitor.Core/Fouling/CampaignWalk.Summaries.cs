using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <content>What is said of a campaign as a whole.</content>
internal sealed partial class CampaignWalk
{
    /// <summary>Bins of a campaign for its growth: a hundredth of it each, so that long campaigns cost no more than short ones.</summary>
    private const int Bins = 100;

    /// <summary>Hours over which the growth at an end of a campaign is drawn.</summary>
    private const int MostForGrowth = 120;

    private Campaign[] Summaries()
    {
        double sinceCleaned = 0;
        return [.. _campaigns.Select(campaign =>
        {
            double produced = campaign.Limit > campaign.From ? _table.Served[campaign.Limit - 1] + 0.5 - campaign.Origin : 0;
            sinceCleaned = campaign.DidNotClean ? sinceCleaned + produced : produced;
            int[] told = [.. Enumerable.Range(campaign.From, campaign.Limit - campaign.From).Where(i => _settled[i] && _results[i].Resistance.IsPresent)];
            int[] first = [.. told.TakeWhile(i => _table.At[i] < _table.At[campaign.From] + LevelSample.Within).Take(LevelSample.Most)];
            int[] last = [.. told.Where(i => _table.At[i] > _table.At[campaign.Limit - 1] - LevelSample.Within).TakeLast(LevelSample.Most)];
            return new Campaign
            {
                Start = campaign.Start,
                End = campaign.End,
                StartedBy = campaign.StartedBy,
                Confidence = campaign.Confidence,
                Products = [.. Enumerable.Range(campaign.From, campaign.Limit - campaign.From).Select(i => _table.Use[i].Product).Distinct()],
                InitialResistance = Carried(first, [.. told.Take(LevelSample.Most)], campaign.Origin),
                FinalResistance = Carried(last, [.. told.TakeLast(MostForGrowth)], told.Length > 0 ? _table.Served[told[^1]] + 0.5 : 0),
                RemovedShare = campaign.RemovedShare,
                GrowthRate = Rate(told),
                ProductionHours = produced,
                HoursSinceCleaned = sinceCleaned,
            };
        })];
    }

    /// <summary>The middle of some hours, carried along the growth of others to a time of service.</summary>
    private Measured Carried(int[] hours, int[] growth, double to)
    {
        if (hours.Length < LevelSample.Fewest) return Measured.Absent;
        int reference = _results[hours[^1]].Reference;
        hours = [.. hours.Where(i => _references[_results[i].Reference].From == _references[reference].From)];
        growth = [.. growth.Where(i => _references[_results[i].Reference].From == _references[reference].From)];
        if (hours.Length < LevelSample.Fewest) return Measured.Absent;
        double[] served = [.. growth.Select(i => _table.Served[i])];
        double slope = Robust.Slope(served, [.. growth.Select(i => _results[i].Resistance.Value)]).Slope;
        double[] carried = [.. hours.Select(i => _results[i].Resistance.Value - (slope * (_table.Served[i] - to)))];
        double distance = 0;
        double[] weights = Lines.Slope(served);
        foreach (int i in hours) distance += (to - _table.Served[i]) / hours.Length;
        for (int k = 0; k < weights.Length; k++)
        {
            weights[k] *= distance;
            if (Array.BinarySearch(hours, growth[k]) >= 0) weights[k] += 1.0 / hours.Length;
        }

        CleanReference held = _references[reference];
        double own = 0, clean = 0;
        foreach (int i in hours)
        {
            own += double.Exp(-_table.LogCoefficient[i]) * double.Max(_table.Random[i], held.HourScatter) / hours.Length;
            clean += _results[i].CleanCoefficient.Random / (_results[i].CleanCoefficient.Value * _results[i].CleanCoefficient.Value) / hours.Length;
        }

        double variance = new HourNoise(double.Max(own, Robust.Spread(carried)), held.SlowShare, true).Variance(weights, [.. growth.Select(i => _table.At[i] / (double)Milliseconds.Hour)]);
        return new Measured(Robust.Location(carried), 0, double.Sqrt((1.1 * variance) + (clean * clean)));
    }

    /// <summary>Growth in a day of production, over the longest stretch that was held against one level.</summary>
    private Measured Rate(int[] told)
    {
        int[] hours = told.GroupBy(i => _references[_results[i].Reference].From).MaxBy(group => group.Count())?.ToArray() ?? [];
        if (hours.Length < LevelSample.Fewest) return Measured.Absent;
        int bins = int.Min(Bins, hours.Length);
        double[] days = new double[bins], resistance = new double[bins];
        for (int b = 0; b < bins; b++)
        {
            int[] bin = hours[(b * hours.Length / bins)..((b + 1) * hours.Length / bins)];
            days[b] = bin.Average(i => _table.Served[i]) / 24;
            resistance[b] = Middle.Of([.. bin.Select(i => _results[i].Resistance.Value)]);
        }

        (double slope, double standard) = Robust.Slope(days, resistance);
        // Neighbouring bins share their slow causes: the uncertainty is that of so many fewer.
        CleanReference reference = _references[_results[hours[0]].Reference];
        double perBin = hours.Length / (double)bins;
        // The share of the slow part in a bin's median, and its correlation from bin to bin.
        double share = reference.SlowShare / (reference.SlowShare + ((1 - reference.SlowShare) / perBin)), phi = double.Pow(HourNoise.Phi, perBin);
        double widen = 1 + (2 * share * phi / (1 - phi));
        return new Measured(slope, 0, standard * double.Sqrt(widen));
    }
}
