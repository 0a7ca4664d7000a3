using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <content>What a campaign lends to hours that have no cleaning of their own: other products, and the time before the first one.</content>
internal sealed partial class CampaignWalk
{
    /// <summary>
    /// A product that follows another without an interruption finds the surface as that one left it: where it never ran after a cleaning, its level is what the
    /// resistance of the moment leaves of it.
    /// </summary>
    private void CarryOver(int index)
    {
        OpenCampaign campaign = _campaigns[index];
        foreach (SurfaceUse use in Enumerable.Range(campaign.From, campaign.Limit - campaign.From).Select(i => _table.Use[i]).Distinct().ToArray())
        {
            if (campaign.Samples.GetValueOrDefault(use)?.Hours.Length >= LevelSample.Fewest || campaign.Links.GetValueOrDefault(use)?.Hours.Length == LevelSample.Most) continue;
            int first = Array.IndexOf(_table.Use, use, campaign.From, campaign.Limit - campaign.From);
            int[] hours = [.. Enumerable.Range(first, campaign.Limit - first)
                .TakeWhile(i => _segment[i] == _segment[first] && _table.At[i] < _table.At[first] + LevelSample.Within).Where(i => _settled[i] && _table.Use[i] == use).Take(LevelSample.Most)];
            int[] before = [.. Enumerable.Range(campaign.From, first - campaign.From).Where(i => _segment[i] == _segment[first] && _settled[i] && _results[i].Resistance.IsPresent && IsLearnt(_references[_results[i].Reference]))];
            int[] last = [.. before.Where(i => _table.At[i] > _table.At[first] - LevelSample.Within).TakeLast(LevelSample.Most)];
            double origin = _table.Served[first] - 0.5;
            Measured carried = Carried(last, [.. before.TakeLast(MostForGrowth)], origin);
            if (hours.Length < LevelSample.Fewest || !carried.IsPresent || campaign.Links.GetValueOrDefault(use)?.Hours.Length == hours.Length) continue;
            campaign.Links[use] = new LevelSample(campaign.Start, hours, origin) { Carried = carried, Before = _table.Use[last[^1]].Product };
            foreach (((SurfaceUse of, long since), int at) in campaign.References)
            {
                if (of == use) _references[at] = Make(index, use, since, campaign.Slopes[use]);
            }

            for (int i = first; i < campaign.Limit; i++)
            {
                if (_table.Use[i] == use) HoldAgainst(i, index);
            }
        }
    }

    /// <summary>
    /// Hours before the first cleaning had nothing to be held against. What is said of them stays; but for learning from them, how clean they were is now known.
    /// </summary>
    private void LookBack(int index)
    {
        OpenCampaign campaign = _campaigns[index];
        long baseline = Baseline(campaign.Start);
        for (int i = campaign.From - 1; i >= 0 && _table.At[i] >= baseline; i--)
        {
            if ((_sharedBy[i] >= 0 && _sharedBy[i] < index) || !campaign.Samples.ContainsKey(_table.Use[i])) continue;
            CleanReference reference = ReferenceOf(index, _table.Use[i], campaign.From);
            if (IsLearnt(reference)) Share(i, reference.Compare(_hours[i].Coefficient, SurfaceConditions.From(_table.ConditionsOf(i))).Cleanliness.Value, index);
        }
    }
}
