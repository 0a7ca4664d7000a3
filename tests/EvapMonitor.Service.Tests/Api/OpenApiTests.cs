using System.Text.Json;
using System.Text.Json.Nodes;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

/// <summary>The interface's description is committed, so that a change of it is seen in review. EVAPMONITOR_UPDATE=1 writes it anew.</summary>
public sealed class OpenApiTests(ApiService api) : IClassFixture<ApiService>
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true, NewLine = "\n", Encoder = System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    [PostgreSqlFact]
    public async Task Description_IsTheCommittedOne()
    {
        string served = Ordered(JsonNode.Parse(await api.Http.GetStringAsync("/openapi/v1.json", TestContext.Current.CancellationToken)))!.ToJsonString(Indented) + "\n";
        string file = Path.Combine(Repository.Root, "docs", "openapi.json");
        if (Environment.GetEnvironmentVariable("EVAPMONITOR_UPDATE") == "1") await File.WriteAllTextAsync(file, served, TestContext.Current.CancellationToken);
        Assert.Equal(await File.ReadAllTextAsync(file, TestContext.Current.CancellationToken), served);
    }

    [PostgreSqlFact]
    public async Task EveryOperation_HasANameAndAnswers()
    {
        JsonNode document = JsonNode.Parse(await api.Http.GetStringAsync("/openapi/v1.json", TestContext.Current.CancellationToken))!;
        var operations = document["paths"]!.AsObject().SelectMany(path => path.Value!.AsObject()).Select(operation => operation.Value!).ToList();
        Assert.True(operations.Count >= 16);
        Assert.Equal(operations.Count, operations.Select(operation => operation["operationId"]!.GetValue<string>()).Distinct().Count());
        Assert.All(operations, operation => Assert.Contains(operation["responses"]!.AsObject(), answer => answer.Key is "200" or "201" or "202" or "204"));
        Assert.StartsWith("3.1", document["openapi"]!.GetValue<string>());
        Assert.Equal("date-time", document["components"]!["schemas"]!["SiteWire"]!["properties"]!["now"]!["format"]?.GetValue<string>());
    }

    /// <summary>Paths and schemas by name, members as they are declared.</summary>
    private static JsonNode? Ordered(JsonNode? document)
    {
        foreach (JsonObject part in new[] { document?["paths"], document?["components"]?["schemas"] }.OfType<JsonObject>())
        {
            var members = part.OrderBy(member => member.Key, StringComparer.Ordinal).ToList();
            part.Clear();
            foreach ((string name, JsonNode? value) in members) part.Add(name, value);
        }

        return document;
    }
}
