namespace EvapMonitor.Service.Api.Wire;

/// <summary>All accepted plant revisions, newest first.</summary>
/// <param name="Revisions">The revisions.</param>
public sealed record RevisionsWire(IReadOnlyList<RevisionWire> Revisions);

/// <summary>An accepted plant revision.</summary>
/// <param name="Revision">Its number: they grow in the order of acceptance.</param>
/// <param name="AcceptedAt">When it was accepted.</param>
/// <param name="InForceFrom">From when it holds; the first also holds for whatever is before.</param>
/// <param name="InForceUntil">Until when; null when no other follows, or when it was replaced.</param>
/// <param name="State">in force, past, coming (it begins later) or replaced (one accepted later has the same start).</param>
/// <param name="ReplacedBy">The revision that replaced it; null when none did.</param>
/// <param name="Author">Who gave it.</param>
/// <param name="Sha256">SHA-256 of the file.</param>
/// <param name="DaysComputed">Days of lines whose shown results were computed under it.</param>
public sealed record RevisionWire(
    int Revision, DateTimeOffset AcceptedAt, DateTimeOffset InForceFrom, DateTimeOffset? InForceUntil, string State, int? ReplacedBy, string Author, string Sha256, int DaysComputed);

/// <summary>What became of a plant file.</summary>
/// <param name="Revision">The revision that it is.</param>
/// <param name="IsNew">False when the same file holds at that time already: nothing changed.</param>
/// <param name="Recomputation">The recomputation of the days that it touches; null when there are none.</param>
public sealed record AcceptedRevisionWire(RevisionWire Revision, bool IsNew, RecomputationWire? Recomputation);

/// <summary>What is wrong in a plant file.</summary>
/// <param name="Line">Line in the file, 1 or more.</param>
/// <param name="Column">Column in that line, 1 or more.</param>
/// <param name="Path">Where it stands, such as lines.north.effects[0].area; empty for the file as a whole.</param>
/// <param name="Found">What was found there.</param>
/// <param name="Allowed">What is allowed there.</param>
public sealed record PlantProblemWire(int Line, int Column, string Path, string Found, string Allowed);

/// <summary>How two plant files differ, line by line.</summary>
/// <param name="From">The revision that is compared with.</param>
/// <param name="To">The revision asked for.</param>
/// <param name="Added">Lines that only it has.</param>
/// <param name="Removed">Lines that only the other has.</param>
/// <param name="Stretches">Changed places with the lines around them.</param>
public sealed record DifferencesWire(int From, int To, int Added, int Removed, IReadOnlyList<DifferentStretchWire> Stretches);

/// <summary>A place where two files differ.</summary>
/// <param name="Lines">Its lines in order.</param>
public sealed record DifferentStretchWire(IReadOnlyList<DifferentLineWire> Lines);

/// <summary>A line of such a place.</summary>
/// <param name="Change">same, added or removed.</param>
/// <param name="FromLine">Its number in the other file; null when it was added.</param>
/// <param name="ToLine">Its number in the file asked for; null when it was removed.</param>
/// <param name="Text">The line.</param>
public sealed record DifferentLineWire(string Change, int? FromLine, int? ToLine, string Text);

/// <summary>The plant has changed.</summary>
/// <param name="Revision">The revision accepted.</param>
public sealed record PlantChangedWire(int Revision);

/// <summary>Recomputations, newest first, at most two hundred.</summary>
/// <param name="Recomputations">The recomputations.</param>
public sealed record RecomputationsWire(IReadOnlyList<RecomputationWire> Recomputations);

/// <summary>Days that are computed anew though none of their readings changed.</summary>
/// <param name="Id">Key.</param>
/// <param name="Cause">plant revision, older model or asked.</param>
/// <param name="Why">The same as a sentence.</param>
/// <param name="Revision">The plant revision; null for other causes.</param>
/// <param name="Line">The line; null for all.</param>
/// <param name="From">First UTC day.</param>
/// <param name="To">Last UTC day.</param>
/// <param name="DaysTotal">Days to compute; a day of two lines counts twice.</param>
/// <param name="DaysDone">Days computed.</param>
/// <param name="DaysLeft">Days that still show their earlier results.</param>
/// <param name="State">running, done or cancelled.</param>
/// <param name="DaysPerMinute">How fast it goes, over the last minute; null when not known.</param>
/// <param name="SecondsLeft">Time left at that rate; null when not known.</param>
/// <param name="StartedAt">When it began.</param>
/// <param name="EndedAt">When it ended; null while it runs.</param>
/// <param name="Author">Who caused it.</param>
public sealed record RecomputationWire(
    int Id, string Cause, string Why, int? Revision, string? Line, DateOnly From, DateOnly To, int DaysTotal, int DaysDone, int DaysLeft, string State, double? DaysPerMinute,
    double? SecondsLeft, DateTimeOffset StartedAt, DateTimeOffset? EndedAt, string Author);

/// <summary>Days to compute anew.</summary>
/// <param name="Line">The line; null or absent for all.</param>
/// <param name="From">First UTC day; null or absent for the first with readings.</param>
/// <param name="To">Last UTC day; null or absent for the last with readings.</param>
public sealed record NewRecomputationWire(string? Line = null, DateOnly? From = null, DateOnly? To = null);
