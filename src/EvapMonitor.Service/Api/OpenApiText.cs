using EvapMonitor.Service.Api.Wire;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace EvapMonitor.Service.Api;

/// <summary>What stands at the head of the interface's description.</summary>
internal static class OpenApiText
{
    public static void Describe(OpenApiOptions options) => options.AddDocumentTransformer((document, _, _) =>
    {
        // Grouped by the noun of the address: /api/v1/cleanings/{id} belongs to cleanings.
        foreach ((string path, IOpenApiPathItem item) in document.Paths)
        {
            string noun = path.Split('/')[3];
            foreach (OpenApiOperation operation in item.Operations?.Values.ToArray() ?? []) operation.Tags = new HashSet<OpenApiTagReference> { new(noun, document) };
        }

        document.Tags = new HashSet<OpenApiTag>(document.Paths.Keys.Select(path => path.Split('/')[3]).Distinct().Order(StringComparer.Ordinal).Select(noun => new OpenApiTag { Name = noun }));
        document.Info = new()
        {
            Title = "EvapMonitor",
            Version = "v1",
            Description = "Apparent heat-transfer coefficients of evaporator effects: history in, results out, cleanings and what is due. "
                + "Times are RFC 3339 in UTC; a number carries its unit in its name; an absent number is null with its reason beside it.",
        };
        // The address differs from machine to machine and says nothing.
        document.Servers?.Clear();
        return Task.CompletedTask;
    });

    /// <summary>Describes the body of a plant file, which is read as it comes.</summary>
    public static Task DescribePlantFile(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken stop)
    {
        operation.RequestBody = new OpenApiRequestBody
        {
            Required = true, Description = "The plant file.",
            Content = new Dictionary<string, OpenApiMediaType> { ["application/yaml"] = new() { Schema = new OpenApiSchema { Type = JsonSchemaType.String } } },
        };
        return Task.CompletedTask;
    }

    /// <summary>
    /// Describes the body of readings by hand: said on the route itself, the router would send other content to the pages of the dashboard instead of a 415.
    /// </summary>
    public static async Task DescribeReadings(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken stop)
    {
        OpenApiSchema schema = await context.GetOrCreateSchemaAsync(typeof(NewReadingsWire), cancellationToken: stop);
        operation.RequestBody = new OpenApiRequestBody
        {
            Required = true, Content = new Dictionary<string, OpenApiMediaType> { ["application/json"] = new() { Schema = schema } },
        };
    }
}
