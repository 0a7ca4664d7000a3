namespace EvapMonitor.Service.Api.Wire;

/// <summary>An instrument that no longer agrees with the others as it used to.</summary>
/// <param name="Since">First day of the change.</param>
/// <param name="Change">By how much more or less than before the others want to add to its readings, in <paramref name="Unit"/>.</param>
/// <param name="Unit">The plant's unit of that difference.</param>
/// <param name="Words">The same as the end of a sentence.</param>
public sealed record ChangeWire(DateTimeOffset Since, double Change, string Unit, string Words);

/// <summary>Something logged of an instrument.</summary>
/// <param name="Id">Key.</param>
/// <param name="Signal">Name of its signal.</param>
/// <param name="Kind">instrument-excluded (its readings do not count from start to end) or recalibration (it was set right at start).</param>
/// <param name="Start">When.</param>
/// <param name="End">End of an exclusion; null: until further notice. Always null of a recalibration.</param>
/// <param name="Note">Free text.</param>
/// <param name="LoggedAt">When it was logged.</param>
public sealed record InstrumentEventWire(Guid Id, string Signal, string Kind, DateTimeOffset Start, DateTimeOffset? End, string Note, DateTimeOffset LoggedAt);

/// <summary>The log of instruments, newest first.</summary>
/// <param name="Events">The entries that stand.</param>
public sealed record InstrumentLogWire(IReadOnlyList<InstrumentEventWire> Events);

/// <summary>Something to log of an instrument.</summary>
/// <param name="Signal">Name of its signal.</param>
/// <param name="Kind">instrument-excluded or recalibration.</param>
/// <param name="Start">When it began, or was done.</param>
/// <param name="End">End of an exclusion; null or absent: until further notice.</param>
/// <param name="Note">Free text, up to 2,000 letters.</param>
public sealed record NewInstrumentEventWire(string? Signal, string? Kind, DateTimeOffset? Start, DateTimeOffset? End = null, string? Note = null);

/// <summary>The log of an instrument changed.</summary>
/// <param name="Signal">Name of its signal.</param>
public sealed record InstrumentLogChangedWire(string Signal);
