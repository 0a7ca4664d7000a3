using EvapMonitor.Core.Outlook;

namespace EvapMonitor.Simulator;

/// <summary>A line at one instant, as it truly is.</summary>
/// <param name="Point">The operating point; null while the line stands.</param>
/// <param name="Product">Value of the signal that tells the product.</param>
/// <param name="Bodies">Bodies that serve each effect; null where every effect is its own body.</param>
/// <param name="Gas">By effect: how far gas takes the chest's thermometer below saturation, K.</param>
internal sealed record LineMoment(
    OperatingPoint? Point, int Product, IReadOnlyDictionary<string, IReadOnlyList<string>>? Bodies, IReadOnlyDictionary<string, double> Gas)
{
    /// <summary>What stands cools to the air around it, K.</summary>
    public const double ColdTemperature = 298.15;
}
