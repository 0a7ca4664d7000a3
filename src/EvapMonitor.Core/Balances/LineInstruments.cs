using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// The instruments of a line in one row: each signal has one place, and each role (feed flow, chest pressure of N2, …) points to a place or to −1 for absent.
/// A signal that serves two roles is one input with one error.
/// </summary>
public sealed class LineInstruments
{
    private readonly List<Instrument> _all = [];
    private readonly Dictionary<string, int> _places = [];

    /// <summary>Lays out the instruments of a line.</summary>
    public LineInstruments(Line line)
    {
        Line = line;
        Feed = Stream(line.Feed);
        Product = Stream(line.Product);
        SteamFlow = Place(line.Steam.Flow);
        SteamPressure = Place(line.Steam.Pressure);
        SteamTemperature = Place(line.Steam.Temperature);
        LiquorSignal = Place(line.Liquor.Signal);
        BleedFlows = [.. line.Bleeds.Select(bleed => Place(bleed.Flow))];
        Effects = [.. line.Effects.Select(effect => new EffectPlaces(
            Place(effect.Chest.Pressure), Place(effect.Chest.Temperature), Place(effect.Chest.CondensateFlow), Place(effect.Chest.CondensateTemperature),
            Place(effect.Vapour.Pressure), Place(effect.Vapour.Temperature),
            Place(effect.Leaving.Flow), Place(effect.Leaving.Solids), Place(effect.Leaving.Temperature), Place(effect.Level), Place(effect.PressureDifference)))];
        Surfaces = [.. line.Effects.Select(effect => new AreaInService(line, effect, Place))];
        Heaters = [.. line.Heaters.Select(heater => new HeaterPlaces(Place(heater.Flow), Place(heater.Solids?.Measured), Place(heater.In), Place(heater.Out)))];
        TankLevels = [.. line.Tanks.Select(tank => Place(tank.Level))];
        StoringLevels = [.. line.Effects.Select((effect, i) => Storing(effect.HoldUp, effect.Level, Effects[i].Level)), .. line.Tanks.Select((tank, t) => Storing(tank.HoldUp, tank.Level, TankLevels[t]))];
        Recompressors = [.. line.Recompressors.Select(machine => new RecompressorPlaces(
            Place(machine.Motive.Flow), Place(machine.Motive.Pressure), Place(machine.Motive.Temperature), Place(machine.Power), Place(machine.Spray)))];
    }

    /// <summary>The line.</summary>
    public Line Line { get; }

    /// <summary>The instruments, one for each signal; a place is an index into this.</summary>
    public IReadOnlyList<Instrument> All => _all;

    /// <summary>Places on the feed.</summary>
    public StreamPlaces Feed { get; }

    /// <summary>Places on the product.</summary>
    public StreamPlaces Product { get; }

    /// <summary>Place of the steam flow.</summary>
    public int SteamFlow { get; }

    /// <summary>Place of the steam pressure.</summary>
    public int SteamPressure { get; }

    /// <summary>Place of the steam temperature.</summary>
    public int SteamTemperature { get; }

    /// <summary>Place of the signal that tells the product.</summary>
    public int LiquorSignal { get; }

    /// <summary>Places of the bleed flows, in the order of the line's bleeds.</summary>
    public IReadOnlyList<int> BleedFlows { get; }

    /// <summary>Places on the effects, in plant-file order.</summary>
    public IReadOnlyList<EffectPlaces> Effects { get; }

    /// <summary>By effect: the surface in service.</summary>
    internal IReadOnlyList<AreaInService> Surfaces { get; }

    /// <summary>Places on the heaters, in the order of the line's heaters.</summary>
    public IReadOnlyList<HeaterPlaces> Heaters { get; }

    /// <summary>Places of the levels, in the order of the line's tanks.</summary>
    public IReadOnlyList<int> TankLevels { get; }

    /// <summary>
    /// By effect, then by tank: the place of the level that tells how much it stores, and what a metre of it holds in kg; −1 and 0 where none does. A level that
    /// two vessels name tells of neither.
    /// </summary>
    public IReadOnlyList<(int Place, double MassPerLevel)> StoringLevels { get; }

    /// <summary>Places on the recompressors, in the order of the line's.</summary>
    public IReadOnlyList<RecompressorPlaces> Recompressors { get; }

    /// <summary>True for an instrument that reads a difference of two pressures.</summary>
    public bool IsDifference(int place) => Effects.Any(effect => effect.PressureDifference == place);

    private (int Place, double MassPerLevel) Storing(double? holdUp, Instrument? level, int place) =>
        HoldUp.MassPerLevel(holdUp, level) is { } mass && Effects.Select(effect => effect.Level).Concat(TankLevels).Count(other => other == place) == 1 ? (place, mass) : (-1, 0);

    private StreamPlaces Stream(LiquorStream stream) =>
        new(Place(stream.Flow), Place(stream.Solids), Place(stream.Temperature), Place(stream.Laboratory));

    private int Place(Instrument? instrument)
    {
        if (instrument is null) return -1;
        if (_places.TryGetValue(instrument.Signal, out int place)) return place;
        _all.Add(instrument);
        return _places[instrument.Signal] = _all.Count - 1;
    }
}

/// <summary>Places of the instruments of a liquor stream; −1 is absent.</summary>
public readonly record struct StreamPlaces(int Flow, int Solids, int Temperature, int Laboratory);

/// <summary>Places of the instruments of a heater; −1 is absent.</summary>
public readonly record struct HeaterPlaces(int Flow, int Solids, int In, int Out);

/// <summary>Places of the instruments of a recompressor; −1 is absent.</summary>
public readonly record struct RecompressorPlaces(int MotiveFlow, int MotivePressure, int MotiveTemperature, int Power, int Spray);

/// <summary>Places of the instruments of an effect; −1 is absent.</summary>
public readonly record struct EffectPlaces(
    int ChestPressure,
    int ChestTemperature,
    int CondensateFlow,
    int CondensateTemperature,
    int VapourPressure,
    int VapourTemperature,
    int LeavingFlow,
    int LeavingSolids,
    int LeavingTemperature,
    int Level,
    int PressureDifference);
