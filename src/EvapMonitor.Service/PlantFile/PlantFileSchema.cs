namespace EvapMonitor.Service.PlantFile;

/// <summary>The JSON Schema (draft 2020-12) with which editors complete and check plant files.</summary>
public static class PlantFileSchema
{
    private const string Name = "plant-file.schema.json";

    /// <summary>The text of the schema, the same as the file shipped beside the program.</summary>
    public static string Text()
    {
        using Stream stream = typeof(PlantFileSchema).Assembly.GetManifestResourceStream(Name)
            ?? throw new InvalidOperationException($"the program was built without {Name}");
        using var reader = new StreamReader(stream);
        return reader.ReadToEnd();
    }
}
