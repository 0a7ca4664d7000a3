namespace EvapMonitor.Service.Tests;

public sealed class ServiceOptionsTests
{
    [Fact]
    public async Task EverythingWrong_IsToldAtOnce()
    {
        var options = new ServiceOptions { Data = " ", Listen = "http://0.0.0.0:8642", Connection = "Colour=red;Password=hidden", Plant = "/nowhere/plant.yaml" };
        StartException error = await Assert.ThrowsAsync<StartException>(() => ServiceHost.StartAsync(options, TestContext.Current.CancellationToken));
        Assert.Equal(["data", "listen", "connection", "plant"], error.Problems.Select(problem => problem.Split(':')[0]));
        Assert.DoesNotContain("hidden", error.Message);
    }

    [Theory]
    [InlineData("http://0.0.0.0:80", false)]
    [InlineData("http://[::]:80", false)]
    [InlineData("http://192.168.0.7:80", false)]
    [InlineData("http://plant.example:80", false)]
    [InlineData("http://*:80", false)]
    [InlineData("https://127.0.0.1:80", false)]
    [InlineData("http://127.0.0.1:80/path", false)]
    [InlineData("127.0.0.1:80", false)]
    [InlineData("", false)]
    [InlineData("http://127.0.0.1:8642", true)]
    [InlineData("http://127.5.5.5:0", true)]
    [InlineData("http://[::1]:8642", true)]
    [InlineData("http://localhost:8642", true)]
    [InlineData("http://localhost:8642/", true)]
    public void Listen_IsLoopbackAlone(string listen, bool allowed)
    {
        IReadOnlyList<string> problems = new ServiceOptions { Data = "x", Listen = listen }.Problems();
        Assert.Equal(allowed, problems.Count == 0);
        Assert.All(problems, problem => Assert.Contains("allowed:", problem));
    }

    [Fact]
    public void Defaults_AreAsDocumented()
    {
        Assert.Equal("http://127.0.0.1:8642", new ServiceOptions { Data = "x" }.Listen);
        Assert.Empty(new ServiceOptions { Data = "x" }.Problems());
    }
}
