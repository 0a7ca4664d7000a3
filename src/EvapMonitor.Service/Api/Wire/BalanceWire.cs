namespace EvapMonitor.Service.Api.Wire;

/// <summary>The reconciled balance of a line in one window.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="At">Start of the window, UTC.</param>
/// <param name="AsOf">Its end.</param>
/// <param name="ChiSquare">Sum of the squared corrections, each in the standard uncertainty of its reading.</param>
/// <param name="Degrees">How many independent checks there are.</param>
/// <param name="ChiSquareLimit">What sound instruments exceed once in a hundred windows; null without any check.</param>
/// <param name="Fits">True when it is not exceeded; null without any check.</param>
/// <param name="Check">The same in words.</param>
/// <param name="Variables">The variables, by place.</param>
/// <param name="Signals">The line's instruments.</param>
/// <param name="Suspects">Sets of instruments of which one is wrong, and those that were left out.</param>
/// <param name="DataVersion">Grows when results of the line change.</param>
public sealed record BalanceWire(
    string Line, DateTimeOffset At, DateTimeOffset AsOf, double ChiSquare, int Degrees, double? ChiSquareLimit, bool? Fits, string Check, IReadOnlyList<BalanceVariableWire> Variables,
    IReadOnlyList<BalanceSignalWire> Signals, IReadOnlyList<SuspectsWire> Suspects, long DataVersion);

/// <summary>A variable of a balance.</summary>
/// <param name="Variable">Its plain name, as in balance.csv: feed_flow, leaving_solids N2.</param>
/// <param name="Place">Where it is: an effect, tank, heater or recompressor by name, feed, product, steam, line, ways.</param>
/// <param name="What">What it is there, in words.</param>
/// <param name="Unit">Unit of the numbers: that of its instrument, else the plant's for such a quantity. Pressures are absolute.</param>
/// <param name="Measured">What its instrument read; null without a reading.</param>
/// <param name="Reconciled">Its value in the balance; null when it cannot be told.</param>
/// <param name="Standard">Standard uncertainty of that.</param>
/// <param name="Correction">Reconciled less measured.</param>
/// <param name="CorrectionInStandards">What the reading is corrected by, in its standard uncertainty.</param>
/// <param name="Class">checked by others, follows from others, cannot be told.</param>
/// <param name="Signals">Its instruments.</param>
/// <param name="Suspicion">What is to be said against them; null when nothing is.</param>
public sealed record BalanceVariableWire(
    string Variable, string Place, string What, string Unit, double? Measured, double? Reconciled, double? Standard, double? Correction, double? CorrectionInStandards, string Class,
    IReadOnlyList<string> Signals, string? Suspicion);

/// <summary>What the balance says of an instrument.</summary>
/// <param name="Signal">Name of the signal.</param>
/// <param name="Fit">How it fits.</param>
public sealed record BalanceSignalWire(string Signal, FitWire Fit);

/// <summary>How the readings of a signal fit those of the others.</summary>
/// <param name="State">fits, does not fit, left out, not checked, no reading.</param>
/// <param name="Words">The same as the end of a sentence, without its time.</param>
/// <param name="Since">Since when it has been so, for does not fit and left out; looked for in the last 30 days.</param>
/// <param name="Wanted">What the others want to add to it, in <paramref name="Unit"/>.</param>
/// <param name="Unit">The plant's unit of that difference.</param>
/// <param name="WantedInStandards">The same in standard uncertainties of the reading.</param>
/// <param name="OneOf">Signals of which one is wrong, this one among them; empty when it is this one or none.</param>
/// <param name="AsOf">End of the window of the verdict.</param>
public sealed record FitWire(
    string State, string Words, DateTimeOffset? Since, double? Wanted, string? Unit, double? WantedInStandards, IReadOnlyList<string> OneOf, DateTimeOffset AsOf);

/// <summary>Instruments of which one is wrong.</summary>
/// <param name="Signals">Their signals; several that these readings cannot tell apart.</param>
/// <param name="LeftOut">True when it does not count any more.</param>
/// <param name="Since">Since when.</param>
/// <param name="Sentence">The same in words.</param>
public sealed record SuspectsWire(IReadOnlyList<string> Signals, bool LeftOut, DateTimeOffset Since, string Sentence);

/// <summary>What the balance wanted to add to the readings of a signal, as columns of equal length.</summary>
/// <param name="Signal">Name of the signal.</param>
/// <param name="Line">The line in whose balance it stands.</param>
/// <param name="Unit">The plant's unit of the corrections.</param>
/// <param name="StepS">Length of a window, s.</param>
/// <param name="Start">The instant from which <paramref name="OffsetS"/> counts.</param>
/// <param name="OffsetS">Start of each window after <paramref name="Start"/>, s.</param>
/// <param name="Wanted">Corrections; null is a gap.</param>
/// <param name="InStandards">The same in standard uncertainties of the reading.</param>
/// <param name="Mark">"", "left out" or "not checked".</param>
/// <param name="DataVersion">Grows when results of the line change.</param>
public sealed record CorrectionsWire(
    string Signal, string Line, string Unit, int StepS, DateTimeOffset Start, IReadOnlyList<long> OffsetS, IReadOnlyList<double?> Wanted, IReadOnlyList<double?> InStandards,
    IReadOnlyList<string> Mark, long DataVersion);

/// <summary>The flow of a way by the balance.</summary>
/// <param name="Value">The reconciled flow.</param>
/// <param name="Standard">Its standard uncertainty.</param>
/// <param name="Unit">Unit of both.</param>
/// <param name="AsOf">End of its window.</param>
/// <param name="Agrees">True where an instrument on this way fits it, false where one does not; null without one.</param>
public sealed record BalanceFlowWire(double Value, double Standard, string Unit, DateTimeOffset AsOf, bool? Agrees);
