namespace EvapMonitor.Service.Api.Wire;

/// <summary>A series of one quantity of one effect, as columns of equal length.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Quantity">The quantity.</param>
/// <param name="Unit">Its unit.</param>
/// <param name="Resolution">window or hour.</param>
/// <param name="StepS">Length of a step, s.</param>
/// <param name="Start">The instant from which <paramref name="OffsetS"/> counts.</param>
/// <param name="OffsetS">Start of each step after <paramref name="Start"/>, s.</param>
/// <param name="Value">Values; null is a gap.</param>
/// <param name="U">Standard uncertainties, both parts.</param>
/// <param name="URandom">The random parts.</param>
/// <param name="Mark">"", "extrapolated" or "not producing".</param>
/// <param name="Reasons">Reasons for gaps.</param>
/// <param name="Reason">Index into <paramref name="Reasons"/>; −1 for none.</param>
/// <param name="DataVersion">Grows when results of the line change.</param>
public sealed record TrendWire(
    string Line, string Effect, string Quantity, string Unit, string Resolution, int StepS, DateTimeOffset Start, IReadOnlyList<long> OffsetS, IReadOnlyList<double?> Value,
    IReadOnlyList<double?> U, IReadOnlyList<double?> URandom, IReadOnlyList<string> Mark, IReadOnlyList<string> Reasons, IReadOnlyList<int> Reason, long DataVersion);

/// <summary>A logged cleaning.</summary>
/// <param name="Id">Key.</param>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Start">When it began.</param>
/// <param name="End">When it ended; null while it goes on.</param>
/// <param name="Kind">The plant's word for it.</param>
/// <param name="Note">Free text.</param>
/// <param name="LoggedAt">When it was logged.</param>
public sealed record CleaningWire(Guid Id, string Line, string Effect, DateTimeOffset Start, DateTimeOffset? End, string Kind, string Note, DateTimeOffset LoggedAt);

/// <summary>Logged cleanings, newest first.</summary>
/// <param name="Cleanings">The cleanings.</param>
public sealed record CleaningsWire(IReadOnlyList<CleaningWire> Cleanings);

/// <summary>A cleaning to log.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Start">When it began.</param>
/// <param name="Kind">The plant's word for it, up to 60 letters.</param>
/// <param name="End">When it ended; null or absent while it goes on.</param>
/// <param name="Note">Free text, up to 2,000 letters.</param>
public sealed record NewCleaningWire(string? Line, string? Effect, DateTimeOffset? Start, string? Kind, DateTimeOffset? End = null, string? Note = null);

/// <summary>Signals and what arrives that no plant file names.</summary>
/// <param name="Signals">Signals of the plant file.</param>
/// <param name="Unknown">Signals that came in and are not in it.</param>
public sealed record SignalsWire(IReadOnlyList<SignalWire> Signals, IReadOnlyList<UnknownSignalWire> Unknown);

/// <summary>A signal with its last reading.</summary>
/// <param name="Name">Name of the signal.</param>
/// <param name="Line">The first line that uses it.</param>
/// <param name="Unit">The unit as the plant file writes it.</param>
/// <param name="LatestAt">Instant of the last reading; null when there is none.</param>
/// <param name="LatestValue">Its value in the plant's unit; null when the source gave none.</param>
/// <param name="LatestQuality">good, uncertain, bad; null when there is no reading.</param>
public sealed record SignalWire(string Name, string Line, string Unit, DateTimeOffset? LatestAt, double? LatestValue, string? LatestQuality);

/// <summary>A signal that the plant file does not name.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Count">How many readings came.</param>
/// <param name="LastSeen">When.</param>
public sealed record UnknownSignalWire(string Name, long Count, DateTimeOffset? LastSeen);

/// <summary>Imports, newest first.</summary>
/// <param name="Imports">The imports.</param>
public sealed record ImportsWire(IReadOnlyList<ImportWire> Imports);

/// <summary>An import and its progress.</summary>
/// <param name="Id">SHA-256 of the file.</param>
/// <param name="Name">Name of the file.</param>
/// <param name="State">waiting, running, done, failed, cancelled.</param>
/// <param name="BytesTotal">Size as uploaded.</param>
/// <param name="BytesRead">Bytes read so far.</param>
/// <param name="Rows">Lines read and committed.</param>
/// <param name="Accepted">Readings stored.</param>
/// <param name="Repeated">Readings that were there already.</param>
/// <param name="Differing">Readings that were there with another value, which stays.</param>
/// <param name="Rejected">Rows or cells not used.</param>
/// <param name="NotInPlant">Readings of signals that the plant does not name.</param>
/// <param name="RowsPerS">Readings per second; null when it does not run.</param>
/// <param name="SecondsLeft">Time left; null when unknown.</param>
/// <param name="StartedAt">When reading began.</param>
/// <param name="EndedAt">When it ended.</param>
/// <param name="Error">Why it failed.</param>
/// <param name="Problems">The first hundred rejected rows.</param>
/// <param name="UnknownSignals">Signals that the plant does not name, the most frequent hundred.</param>
public sealed record ImportWire(
    string Id, string Name, string State, long BytesTotal, long BytesRead, long Rows, long Accepted, long Repeated, long Differing, long Rejected, long NotInPlant,
    double? RowsPerS, double? SecondsLeft, DateTimeOffset? StartedAt, DateTimeOffset? EndedAt, string? Error, IReadOnlyList<ProblemRowWire> Problems,
    IReadOnlyList<UnknownSignalWire> UnknownSignals);

/// <summary>A row that was not used.</summary>
/// <param name="Line">Line number in the file; the header is 1.</param>
/// <param name="Reason">Why.</param>
public sealed record ProblemRowWire(long Line, string Reason);

/// <summary>The plant file in force.</summary>
/// <param name="Revision">Its number.</param>
/// <param name="AcceptedAt">When it was accepted.</param>
/// <param name="InForceFrom">From when it holds.</param>
/// <param name="Author">Who gave it.</param>
/// <param name="Text">The file.</param>
public sealed record PlantWire(int Revision, DateTimeOffset AcceptedAt, DateTimeOffset InForceFrom, string Author, string Text);

/// <summary>Results of a line changed.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="From">First instant that may have changed.</param>
/// <param name="To">The last.</param>
public sealed record WindowsChangedWire(string Line, DateTimeOffset From, DateTimeOffset To);

/// <summary>Cleanings of an effect changed.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
public sealed record CleaningsChangedWire(string Line, string Effect);
