using System.Globalization;
using System.Reflection;
using System.Text.Json;
using System.Text.Json.Nodes;
using EvapMonitor.Service.PlantFile;
using Json.Schema;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class SchemaTests
{
    private static readonly string Text = PlantFileSchema.Text();
    private static readonly JsonSchema Schema = JsonSchema.FromText(Text);

    [Fact]
    public void ShippedFile_IsTheEmbeddedOne() =>
        Assert.Equal(Text, File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "PlantFile", "plant-file.schema.json")));

    [Fact]
    public void ExampleFiles_AreValid()
    {
        foreach (string file in Examples.Files) Assert.Empty(Flaws(File.ReadAllText(file)));
        Assert.Empty(Flaws(Examples.Small));
        Assert.Empty(Flaws(EveryKey()));
        Assert.Empty(Flaws(Examples.Own("block-style.yaml")));
    }

    [Theory]
    [InlineData("area: 610 m2", "area: 610")]
    [InlineData("area: 610 m2", "aera: 610 m2")]
    [InlineData("accuracy: 1 %", "accuracy: 1 percent")]
    [InlineData("heating: vapour of E1", "heating: 3 bar")]
    [InlineData("unit: t/h, ", "")]
    [InlineData("time-zone: UTC", "")]
    public void WrongFiles_AreInvalidForSchemaAndReader(string old, string changed)
    {
        string text = Examples.With(old, changed);
        Assert.NotEmpty(Flaws(text));
        Assert.NotEmpty(PlantFileReader.Read(text).Problems);
    }

    [Theory]
    [InlineData("liquor: E1", "liquor: [E1]")]
    [InlineData("liquor: E1", "liquor: {from: E1}")]
    [InlineData("liquor: E1", "liquor: [{from: E1, share: 60 °Bx +/- 5 g/kg}]")]
    [InlineData("heating: steam", "heating: [steam]")]
    [InlineData("area: 610 m2", "area: 6.1e2 m²\n      vent: 0 %\n      heat-loss: 1%±1%")]
    [InlineData("accuracy: 1 %", "accuracy: .5 % of reading standard")]
    [InlineData("name: E2", "name: 2")]
    [InlineData("site: Lyngdal", "site: 12.5")]
    [InlineData("atmosphere: 1013 mbar", "atmosphere: {signal: 17, unit: hPa}")]
    [InlineData("atmosphere: 1013 mbar", "cleaning-rules: {allowed: ['Sat 22:00-06:00', Mon-Fri 00:00-24:00], not-together: [[one.E1, E2]]}")]
    [InlineData("history-from: 2026-01-01", "history-from: 2026-01-01T06:00:00+01:00")]
    public void OtherWaysOfWriting_AreValidForSchemaAndReader(string old, string changed)
    {
        string text = Examples.With(old, changed);
        Examples.Sound(text);
        Assert.Empty(Flaws(text));
    }

    /// <summary>An editor must not mark as wrong what the program takes.</summary>
    [Fact]
    public void FilesThatTheReaderTakes_AreValid()
    {
        var wronged = new List<string>();
        int taken = 0;
        foreach (string text in Examples.Mutations([.. Examples.Files.Select(File.ReadAllText), Examples.Small], 1871, 1200, 1))
        {
            if (PlantFileReader.Read(text).Site is null) continue;
            taken++;
            wronged.AddRange(Flaws(text));
        }

        Assert.Empty(wronged);
        Assert.True(taken > 100, $"only {taken} files were taken: this proves nothing");
    }

    [Fact]
    public void SchemaAndReader_KnowTheSameKeys()
    {
        JsonElement definitions = JsonDocument.Parse(Text).RootElement.GetProperty("$defs");
        var ofSchema = definitions.EnumerateObject().Where(d => d.Value.TryGetProperty("properties", out _))
            .ToDictionary(d => d.Name, d => string.Join(' ', d.Value.GetProperty("properties").EnumerateObject().Select(p => p.Name).Order()));
        var ofReader = PlantFileKeys.All.ToDictionary(k => k.Name, k => string.Join(' ', k.Keys.Order()));
        Assert.Equal(ofReader.OrderBy(k => k.Key), ofSchema.OrderBy(k => k.Key));
        Assert.Equal(
            typeof(PlantFileKeys).GetFields(BindingFlags.Public | BindingFlags.Static).Where(f => f.FieldType == typeof(KeySet)).Select(f => ((KeySet)f.GetValue(null)!).Name).Order(),
            ofReader.Keys.Order());
    }

    /// <summary>Puts nonsense in place of every value of a file that has every key: each must be a problem at its own place, or the reader overlooks a key.</summary>
    [Fact]
    public void NonsenseAtAnyKey_IsAProblemThere()
    {
        var overlooked = new List<string>();
        foreach ((string path, string text) in WithNonsense(EveryKey()))
        {
            if (!PlantFileReader.Read(text).Problems.Any(p => p.Path.StartsWith(path, StringComparison.Ordinal))) overlooked.Add(path);
        }

        Assert.Empty(overlooked);
    }

    [Fact]
    public void FileWithEveryKey_HasEveryKey()
    {
        var seen = new HashSet<string>(StringComparer.Ordinal);
        Visit(YamlText.Read(EveryKey(), new Findings())!, seen);
        Assert.Empty(PlantFileKeys.All.SelectMany(k => k.Keys).Except(seen));
    }

    private static string EveryKey() => Examples.Own("every-key.yaml");

    private static void Visit(PlantNode node, HashSet<string> seen)
    {
        if (node is ListNode list) list.Items.ForEach(item => Visit(item, seen));
        if (node is not MappingNode mapping) return;
        foreach (MappingEntry entry in mapping.Entries)
        {
            seen.Add(entry.Key.Text);
            Visit(entry.Value, seen);
        }
    }

    private static IEnumerable<(string Path, string Text)> WithNonsense(string text)
    {
        JsonNode root = ToJson(YamlText.Read(text, new Findings())!)!;
        foreach ((string path, JsonObject parent, string key) in Places("", root).ToList())
        {
            JsonNode? kept = parent[key];
            parent[key] = new JsonArray(new JsonArray(new JsonArray()));
            yield return (path, root.ToJsonString());
            parent[key] = kept;
        }
    }

    private static IEnumerable<(string Path, JsonObject Parent, string Key)> Places(string path, JsonNode? node)
    {
        if (node is JsonArray list) return list.SelectMany((item, i) => Places(path + FormattableString.Invariant($"[{i}]"), item));
        if (node is not JsonObject mapping) return [];
        return mapping.ToList().SelectMany(entry =>
        {
            string at = path.Length == 0 ? entry.Key : path + "." + entry.Key;
            return Places(at, entry.Value).Append((at, mapping, entry.Key));
        });
    }

    private static IReadOnlyList<string> Flaws(string yaml)
    {
        JsonElement instance = JsonSerializer.SerializeToElement(ToJson(YamlText.Read(yaml, new Findings())!));
        EvaluationResults results = Schema.Evaluate(instance, new EvaluationOptions { OutputFormat = OutputFormat.List });
        if (results.IsValid) return [];
        return [.. (results.Details ?? []).Where(d => d.Errors is not null).SelectMany(d => d.Errors!.Select(e => d.InstanceLocation + ": " + e.Value)).DefaultIfEmpty("invalid")];
    }

    /// <summary>Plain scalars as the core schema of YAML 1.2 reads them, which is how editors see them.</summary>
    private static JsonNode? ToJson(PlantNode node) => node switch
    {
        MappingNode mapping => new JsonObject(mapping.Entries.Select(e => KeyValuePair.Create(e.Key.Text, ToJson(e.Value)))),
        ListNode list => new JsonArray([.. list.Items.Select(ToJson)]),
        ScalarNode { IsNothing: true } => null,
        ScalarNode { Plain: true } plain when long.TryParse(plain.Text, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out long whole) => whole,
        ScalarNode { Plain: true } plain when Texts.TryNumber(plain.Text, out double number) => number,
        ScalarNode scalar => scalar.Text,
        _ => null,
    };
}
