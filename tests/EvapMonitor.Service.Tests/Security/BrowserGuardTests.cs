using System.Net;
using System.Net.Http.Headers;
using System.Text;
using EvapMonitor.Service.Tests.Support;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Tests.Security;

public sealed class BrowserGuardTests(ApiService api) : IClassFixture<ApiService>
{
    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlTheory]
    [InlineData("evil.example")]
    [InlineData("127.0.0.1.evil.example")]
    [InlineData("localhost.evil.example:8642")]
    public async Task ForeignHost_IsRefused(string host)
    {
        using var request = new HttpRequestMessage(HttpMethod.Get, "/api/v1/site");
        request.Headers.Host = host;
        Assert.Contains("allowed: localhost, 127.0.0.1, [::1]", await api.ProblemAsync(HttpStatusCode.Forbidden, request));
    }

    [PostgreSqlTheory]
    [InlineData("https://evil.example")]
    [InlineData("null")]
    [InlineData("http://127.0.0.1:1")]
    public async Task ForeignOrigin_IsRefused_EvenToRead(string origin)
    {
        foreach (HttpMethod method in new[] { HttpMethod.Get, HttpMethod.Post, HttpMethod.Options })
        {
            using var request = new HttpRequestMessage(method, method == HttpMethod.Post ? "/api/v1/cleanings" : "/api/v1/site");
            request.Headers.Add("Origin", origin);
            request.Headers.Add("Access-Control-Request-Method", "POST");
            Assert.Contains("another web page", await api.ProblemAsync(HttpStatusCode.Forbidden, request));
        }
    }

    [PostgreSqlFact]
    public async Task OwnPage_IsServed_WithoutLeaveForOthers()
    {
        using var request = new HttpRequestMessage(HttpMethod.Get, "/api/v1/site");
        request.Headers.Add("Origin", api.Service.Address);
        using HttpResponseMessage answer = await api.Http.SendAsync(request, Stop);
        Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        Assert.DoesNotContain(answer.Headers, header => header.Key.StartsWith("Access-Control-", StringComparison.OrdinalIgnoreCase));
        Assert.False(answer.Headers.Contains("Server"));
        string policy = Assert.Single(answer.Headers.GetValues("Content-Security-Policy"));
        Assert.Contains("default-src 'self'", policy);
        Assert.DoesNotContain("unsafe", policy);
        Assert.Equal("nosniff", Assert.Single(answer.Headers.GetValues("X-Content-Type-Options")));
    }

    [PostgreSqlTheory]
    [InlineData("text/plain")]
    [InlineData("application/x-www-form-urlencoded")]
    [InlineData("multipart/form-data")]
    public async Task SimpleRequestsOfForms_AreRefused(string type)
    {
        // These types need no leave from the service before a foreign page may send them.
        using var cleaning = new HttpRequestMessage(HttpMethod.Post, "/api/v1/cleanings") { Content = new StringContent("{}", Encoding.UTF8, type) };
        await api.ProblemAsync(HttpStatusCode.UnsupportedMediaType, cleaning);
        using var upload = new HttpRequestMessage(HttpMethod.Post, "/api/v1/imports?name=x.csv") { Content = new StringContent("time,A\n", Encoding.UTF8, type) };
        Assert.Contains("allowed: text/csv, application/gzip", await api.ProblemAsync(HttpStatusCode.UnsupportedMediaType, upload));
    }

    [PostgreSqlFact]
    public async Task Uploads_NeedANameAndABody()
    {
        using var nameless = new HttpRequestMessage(HttpMethod.Post, "/api/v1/imports") { Content = Csv("time,A\n") };
        Assert.Contains("name is missing", await api.ProblemAsync(HttpStatusCode.BadRequest, nameless));
        using var empty = new HttpRequestMessage(HttpMethod.Post, "/api/v1/imports?name=x.csv") { Content = Csv("") };
        Assert.Equal("The body is empty.", await api.ProblemAsync(HttpStatusCode.BadRequest, empty));
        using var replace = new HttpRequestMessage(HttpMethod.Post, "/api/v1/imports?name=x.csv&replace=perhaps") { Content = Csv("time,A\n") };
        Assert.Equal("replace is 'perhaps'; allowed: true or false.", await api.ProblemAsync(HttpStatusCode.BadRequest, replace));
        Assert.Empty(Directory.GetFiles(api.Service.UploadFolder));
    }

    private static StringContent Csv(string text) => new(text, new MediaTypeHeaderValue("text/csv"));
}
