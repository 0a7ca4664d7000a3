namespace EvapMonitor.Core.Readings;

/// <summary>The readings of one signal as columns, in ascending order of their instants.</summary>
public sealed class ReadingSeries
{
    private long[] _at = [];
    private double[] _value = [];
    private Quality[] _quality = [];

    /// <summary>Number of readings.</summary>
    public int Count { get; private set; }

    /// <summary>Instants, ms since 1970-01-01T00:00:00Z, strictly ascending.</summary>
    public ReadOnlySpan<long> At => _at.AsSpan(0, Count);

    /// <summary>Values in the signal's unit; NaN where the source gave none.</summary>
    public ReadOnlySpan<double> Value => _value.AsSpan(0, Count);

    /// <summary>Qualities as the source states them.</summary>
    public ReadOnlySpan<Quality> Quality => _quality.AsSpan(0, Count);

    /// <summary>Adds a reading at the end, or in its place when it comes late. The first value of an instant wins.</summary>
    /// <returns>False when the instant is already there.</returns>
    public bool Add(Reading reading)
    {
        int place = Count == 0 || reading.At > _at[Count - 1] ? ~Count : Array.BinarySearch(_at, 0, Count, reading.At);
        if (place >= 0) return false;
        place = ~place;
        if (Count == _at.Length) Grow(int.Max(64, 2 * Count));
        if (place < Count)
        {
            Array.Copy(_at, place, _at, place + 1, Count - place);
            Array.Copy(_value, place, _value, place + 1, Count - place);
            Array.Copy(_quality, place, _quality, place + 1, Count - place);
        }

        (_at[place], _value[place], _quality[place]) = (reading.At, reading.Value, reading.Quality);
        Count++;
        return true;
    }

    /// <summary>Index of the first reading at or after an instant; <see cref="Count"/> when there is none.</summary>
    public int IndexFrom(long at)
    {
        int place = Array.BinarySearch(_at, 0, Count, at);
        return place >= 0 ? place : ~place;
    }

    private void Grow(int capacity)
    {
        Array.Resize(ref _at, capacity);
        Array.Resize(ref _value, capacity);
        Array.Resize(ref _quality, capacity);
    }
}
