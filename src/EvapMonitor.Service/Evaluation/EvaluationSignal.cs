using EvapMonitor.Service.Live;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Wakes the evaluation when days may wait.</summary>
public sealed class EvaluationSignal : WakeUp;
