namespace EvapMonitor.Service.Ingest.Spool;

/// <summary>Watches the free space of the spool's disk, at most once a second. Used by one thread.</summary>
internal sealed class DiskSpace(string folder, long reserve, TimeProvider clock)
{
    private static readonly TimeSpan Every = TimeSpan.FromSeconds(1);
    private readonly DriveInfo _drive = new(Path.GetFullPath(folder));
    private long _looked;
    private string? _why;

    /// <summary>Null, or why nothing more may be written.</summary>
    public string? WhyFull()
    {
        if (_looked != 0 && clock.GetElapsedTime(_looked) < Every) return _why;
        _looked = clock.GetTimestamp();
        try
        {
            long free = _drive.AvailableFreeSpace;
            _why = free < reserve ? Invariant($"The disk of the spool has {free >> 20} MiB left, less than the reserve of {reserve >> 20} MiB.") : null;
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            // A disk that does not tell is written until it says no.
            _why = null;
        }

        return _why;
    }
}
