namespace EvapMonitor.Core.Fouling;

/// <summary>Slopes as the hours within days show them.</summary>
/// <param name="Slopes">b1, b2, b3; 0 where not estimated.</param>
/// <param name="Covariance">Their covariance; 0 where not estimated.</param>
/// <param name="FirstStage">F of the instrument, clustered by day; NaN without one.</param>
/// <param name="Noise">What the hours scatter about them.</param>
internal sealed record SlopeEstimate(double[] Slopes, double[,] Covariance, double FirstStage, HourNoise Noise);
