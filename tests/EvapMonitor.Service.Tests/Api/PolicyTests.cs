using EvapMonitor.Service.Security;
using EvapMonitor.Service.Tests.Support;
using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;

namespace EvapMonitor.Service.Tests.Api;

public sealed class PolicyTests(ApiService api) : IClassFixture<ApiService>
{
    [PostgreSqlFact]
    public void EveryEndpoint_CarriesExactlyOnePolicy()
    {
        var endpoints = api.Service.Services.GetRequiredService<EndpointDataSource>().Endpoints;
        Assert.True(endpoints.Count > 20, $"only {endpoints.Count} endpoints");
        Assert.All(endpoints, endpoint =>
        {
            var given = endpoint.Metadata.GetOrderedMetadata<IAuthorizeData>();
            Assert.True(given.Count == 1, $"{endpoint.DisplayName} carries {given.Count} policies");
            Assert.Contains(given[0].Policy, Policies.All);
            Assert.Null(endpoint.Metadata.GetMetadata<IAllowAnonymous>());
        });
    }

    [PostgreSqlFact]
    public void RoutesThatChangeData_AskForMoreThanRead()
    {
        var changing = api.Service.Services.GetRequiredService<EndpointDataSource>().Endpoints
            .Where(endpoint => endpoint.Metadata.GetMetadata<HttpMethodMetadata>()?.HttpMethods.Any(method => method is "POST" or "PUT" or "PATCH" or "DELETE") == true).ToList();
        Assert.NotEmpty(changing);
        Assert.All(changing, endpoint => Assert.NotEqual(Policies.Read, endpoint.Metadata.GetRequiredMetadata<IAuthorizeData>().Policy));
    }
}
