namespace EvapMonitor.Core.Plant;

/// <summary>What the best length of a campaign is measured by.</summary>
public enum CampaignObjective
{
    /// <summary>Least cost per time: demand fixes the output.</summary>
    PerTime,
    /// <summary>Least cost per product: the line limits the output.</summary>
    PerProduct,
}

/// <summary>What steam and lost evaporation cost a line.</summary>
/// <param name="Currency">ISO 4217 code.</param>
/// <param name="Steam">Cost of heating steam per kg; null when not given.</param>
/// <param name="LostEvaporation">Cost of water not evaporated per kg; null when not given.</param>
/// <param name="Objective">What the best campaign is measured by. Default <see cref="CampaignObjective.PerTime"/>.</param>
public sealed record Money(string Currency, double? Steam, double? LostEvaporation, CampaignObjective Objective);
