using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Code;

/// <summary>Which folder of the service may know which.</summary>
public class FolderTests
{
    private static readonly string Service = Path.Combine(Repository.Root, "src", "EvapMonitor.Service");

    [Theory]
    [InlineData("Ingest")]
    [InlineData("Store")]
    [InlineData("Evaluation")]
    [InlineData("Live")]
    [InlineData("Wording")]
    [InlineData("PlantFile")]
    public void Folder_NeverUsesTheInterface(string folder)
    {
        string[] files = Directory.GetFiles(Path.Combine(Service, folder), "*.cs", SearchOption.AllDirectories);
        Assert.NotEmpty(files);
        Assert.DoesNotContain(files, file => File.ReadAllText(file).Contains("EvapMonitor.Service.Api", StringComparison.Ordinal));
    }

    // The rule above holds only as long as uses are found at all: this one is real.
    [Fact]
    public void UseOfTheInterface_IsSeen() => Assert.Contains("EvapMonitor.Service.Api", File.ReadAllText(Path.Combine(Service, "ServiceParts.cs")), StringComparison.Ordinal);
}
