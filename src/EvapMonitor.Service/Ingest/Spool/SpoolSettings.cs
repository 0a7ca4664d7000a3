namespace EvapMonitor.Service.Ingest.Spool;

/// <summary>Where the spool lies and how much it may hold.</summary>
/// <param name="Folder">The folder; made when absent.</param>
public sealed record SpoolSettings(string Folder)
{
    /// <summary>Most bytes of readings that wait in the spool. Default 2 GiB, about 150 million readings.</summary>
    public long Quota { get; init; } = 2L << 30;

    /// <summary>Bytes that the spool leaves free on its disk, for the database beside it. Default 512 MiB.</summary>
    public long Reserve { get; init; } = 512L << 20;
}
