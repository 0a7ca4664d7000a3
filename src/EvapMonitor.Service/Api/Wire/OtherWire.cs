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
/// <param name="Steady">Whether the line was steady and the effect not being cleaned; null: not judged. An hour is made of windows that are not false.</param>
/// <param name="Reasons">Reasons for gaps.</param>
/// <param name="Reason">Index into <paramref name="Reasons"/>; −1 for none.</param>
/// <param name="DataVersion">Grows when results of the line change.</param>
public sealed record TrendWire(
    string Line, string Effect, string Quantity, string Unit, string Resolution, int StepS, DateTimeOffset Start, IReadOnlyList<long> OffsetS, IReadOnlyList<double?> Value,
    IReadOnlyList<double?> U, IReadOnlyList<double?> URandom, IReadOnlyList<string> Mark, IReadOnlyList<bool?> Steady,
    IReadOnlyList<string> Reasons, IReadOnlyList<int> Reason, long DataVersion);

/// <summary>A cleaning: logged, told by a signal, or recognised by its effect.</summary>
/// <param name="Id">Key of the log entry; null for what nobody logged.</param>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Body">The body that was cleaned, where the entry names one.</param>
/// <param name="Start">When it began.</param>
/// <param name="End">When it ended; null while it goes on.</param>
/// <param name="Kind">The plant's word for it; empty for what nobody logged.</param>
/// <param name="Note">Free text.</param>
/// <param name="LoggedAt">When it was logged; null for what nobody logged.</param>
/// <param name="KnownBy">logged, signal, recognised, rejected (a person says that there was none).</param>
/// <param name="Result">What it brought; null until that is computed.</param>
public sealed record CleaningWire(
    Guid? Id, string Line, string Effect, string? Body, DateTimeOffset Start, DateTimeOffset? End, string Kind, string Note, DateTimeOffset? LoggedAt, string KnownBy,
    CleaningResultWire? Result);

/// <summary>What a cleaning brought.</summary>
/// <param name="Surface">The surface.</param>
/// <param name="Verdict">cleaned, did not clean, cannot be told, awaiting hours.</param>
/// <param name="Reason">Why it cannot be told, or what is awaited; empty otherwise.</param>
/// <param name="BeforeM2kW">Fouling resistance before, m²·K/W.</param>
/// <param name="RemovedM2kW">Removed.</param>
/// <param name="LeftM2kW">Left, against the best of the latest cleanings.</param>
/// <param name="RemovedShare">Removed as a share of what was there; null when not known.</param>
/// <param name="Confidence">How sure it is that the coefficient rose, 0 to 1; null when it cannot be compared.</param>
public sealed record CleaningResultWire(
    string Surface, string Verdict, string Reason,
    [property: System.Text.Json.Serialization.JsonPropertyName("before_m2k_w")] UncertainWire BeforeM2kW,
    [property: System.Text.Json.Serialization.JsonPropertyName("removed_m2k_w")] UncertainWire RemovedM2kW,
    [property: System.Text.Json.Serialization.JsonPropertyName("left_m2k_w")] UncertainWire LeftM2kW, double? RemovedShare, double? Confidence);

/// <summary>Cleanings, newest first.</summary>
/// <param name="Cleanings">The cleanings.</param>
public sealed record CleaningsWire(IReadOnlyList<CleaningWire> Cleanings);

/// <summary>A cleaning to log.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Start">When it began.</param>
/// <param name="Kind">The plant's word for it, up to 60 letters.</param>
/// <param name="End">When it ended; null or absent while it goes on.</param>
/// <param name="Note">Free text, up to 2,000 letters.</param>
/// <param name="Body">The body that was cleaned, of an effect with bodies; null or absent: the one that served.</param>
/// <param name="Rejected">True: there was no cleaning in this time, whatever was recognised. Then kind may be absent, and end must not.</param>
public sealed record NewCleaningWire(
    string? Line, string? Effect, DateTimeOffset? Start, string? Kind = null, DateTimeOffset? End = null, string? Note = null, string? Body = null, bool Rejected = false);

/// <summary>Signals and what arrives that no plant file names.</summary>
/// <param name="AsOf">The instant of the ages and shares.</param>
/// <param name="Signals">Signals of the plant file.</param>
/// <param name="Unknown">Signals that came in and are not in it, most frequent first, at most a thousand.</param>
public sealed record SignalsWire(DateTimeOffset AsOf, IReadOnlyList<SignalWire> Signals, IReadOnlyList<UnknownSignalWire> Unknown);

/// <summary>A signal with its last reading and how sound it was over the last 24 hours.</summary>
/// <param name="Name">Name of the signal.</param>
/// <param name="Line">The first line that uses it.</param>
/// <param name="Unit">The unit as the plant file writes it.</param>
/// <param name="LatestAt">Instant of the last reading; null when there is none.</param>
/// <param name="LatestValue">Its value in the plant's unit; null when the source gave none.</param>
/// <param name="LatestQuality">good, uncertain, bad; null when there is no reading.</param>
/// <param name="GoodShare">Share of the last 24 hours with a sound value, 0 to 1; null when there was no reading.</param>
/// <param name="Rejected">Readings left out in that time, by reason.</param>
/// <param name="Readings">Sound readings in that time.</param>
/// <param name="Fit">What the last balance of its line says of it; null when there is none.</param>
/// <param name="Changed">How it has changed against the others over the last weeks; null when it has not, or it cannot be told.</param>
public sealed record SignalWire(
    string Name, string Line, string Unit, DateTimeOffset? LatestAt, double? LatestValue, string? LatestQuality, double? GoodShare, RejectedWire Rejected, long Readings, FitWire? Fit,
    ChangeWire? Changed);

/// <summary>Readings left out, by reason.</summary>
/// <param name="Bad">Bad by the source.</param>
/// <param name="NotANumber">No number.</param>
/// <param name="OutOfRange">Outside the instrument's range.</param>
/// <param name="Frozen">Stood still while its neighbours moved.</param>
public sealed record RejectedWire(long Bad, long NotANumber, long OutOfRange, long Frozen);

/// <summary>A signal that the plant file does not name.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Count">How many readings came.</param>
/// <param name="LastSeen">When.</param>
/// <param name="Source">Where the last one came from; null when not known.</param>
public sealed record UnknownSignalWire(string Name, long Count, DateTimeOffset? LastSeen, string? Source = null);

/// <summary>Where readings come from, what waits, what the database would not take.</summary>
/// <param name="Sources">The sources.</param>
/// <param name="Spool">What waits for the database.</param>
/// <param name="Refused">The last readings that the database would not take, newest first.</param>
public sealed record SourcesWire(IReadOnlyList<SourceWire> Sources, SpoolWire Spool, IReadOnlyList<RefusedWire>? Refused);

/// <summary>A source. Counts are since the service started.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Kind">mqtt (a broker that is read), broker (the service's own), http.</param>
/// <param name="Address">Where it is.</param>
/// <param name="ConnectedSince">Null while it is not connected.</param>
/// <param name="LastMessageAt">When the last message came.</param>
/// <param name="Accepted">Readings that are durable.</param>
/// <param name="Malformed">Messages that could not be read.</param>
/// <param name="OutOfTime">Readings too far ahead of the clock or before the plant's history.</param>
/// <param name="Unknown">Readings of signals that the plant file does not name.</param>
/// <param name="InstantUnknown">Retained messages without a time.</param>
/// <param name="Shed">Messages without a promise (QoS 0) that were dropped.</param>
/// <param name="Refused">Times that it was told to come again later.</param>
/// <param name="Reconnects">Connections made after the first.</param>
/// <param name="LastError">The last thing that went wrong with the connection.</param>
/// <param name="Samples">The last messages and readings that were not used, oldest first.</param>
public sealed record SourceWire(
    string Name, string Kind, string Address, DateTimeOffset? ConnectedSince, DateTimeOffset? LastMessageAt, long Accepted, long Malformed, long OutOfTime, long Unknown,
    long InstantUnknown, long Shed, long Refused, long Reconnects, string? LastError, IReadOnlyList<SampleWire> Samples);

/// <summary>A message or reading that was not used.</summary>
/// <param name="At">When it came.</param>
/// <param name="Where">Topic or signal.</param>
/// <param name="Reason">Why it was not used.</param>
public sealed record SampleWire(DateTimeOffset At, string Where, string Reason);

/// <summary>What waits for the database.</summary>
/// <param name="Bytes">Its size on disk.</param>
public sealed record SpoolWire(long Bytes);

/// <summary>A reading that the database would not take.</summary>
/// <param name="RefusedAt">When.</param>
/// <param name="Signal">The signal.</param>
/// <param name="At">Instant of the reading.</param>
/// <param name="Value">Its value.</param>
/// <param name="Quality">Its quality.</param>
/// <param name="Source">Where it came from.</param>
/// <param name="Reason">What the database said.</param>
public sealed record RefusedWire(DateTimeOffset RefusedAt, string Signal, DateTimeOffset At, double? Value, string Quality, string Source, string Reason);

/// <summary>Something that the operator should know as long as it lasts.</summary>
/// <param name="Key">What it is about.</param>
/// <param name="Since">Since when.</param>
/// <param name="Sentence">What is the matter, for people.</param>
public sealed record NoticeWire(string Key, DateTimeOffset Since, string Sentence);

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
