namespace EvapMonitor.Service.Store;

/// <summary>Holds the plant in force for all that need it. Set once before anything else starts, and again when a new revision is accepted.</summary>
public sealed class PlantHolder
{
    private volatile PlantInForce? _plant;

    /// <summary>The plant in force.</summary>
    /// <exception cref="InvalidOperationException">None was set yet.</exception>
    public PlantInForce Current
    {
        get => _plant ?? throw new InvalidOperationException("No plant file has been accepted yet.");
        set => _plant = value;
    }
}
