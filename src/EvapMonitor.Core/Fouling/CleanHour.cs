using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// How clean a surface was in an hour of production. Uncertainties are the random part of the hour (or the scatter of hours, where that is larger) and that of the
/// clean expectation: instruments that are off by a constant are off by the same share on both sides, and cancel.
/// </summary>
/// <param name="Hour">Start of the hour, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Campaign">Index of its campaign. An hour within an interruption belongs to the campaign that ended.</param>
/// <param name="Reference">Index of its clean expectation, whose basis may be none: then all that follows is absent.</param>
/// <param name="CleanCoefficient">What a clean surface would do at the conditions of the hour, W/(m²·K).</param>
/// <param name="Cleanliness">U/U_clean.</param>
/// <param name="Resistance">1/U − 1/U_clean, m²·K/W; may be negative.</param>
/// <param name="AtReference">Coefficient that the surface with this resistance would have at the reference conditions, W/(m²·K).</param>
/// <param name="Clamped">True when a condition was outside the learnt range and held at its border.</param>
public sealed record CleanHour(
    long Hour, int Campaign, int Reference, Measured CleanCoefficient, Measured Cleanliness, Measured Resistance, Measured AtReference, bool Clamped);
