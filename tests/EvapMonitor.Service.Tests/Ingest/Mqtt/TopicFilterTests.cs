using EvapMonitor.Service.Ingest.Mqtt;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

public class TopicFilterTests
{
    [Theory]
    [InlineData("a/b", "a/b", "")]
    [InlineData("a/+", "a/b", "b")]
    [InlineData("+/x/+", "n/x/1", "n|1")]
    [InlineData("a/#", "a/b/c", "b/c")]
    [InlineData("a/#", "a", "")]
    [InlineData("#", "a/b", "a/b")]
    [InlineData("+/b", "/b", "")]
    public void Match_TellsWhatWildcardsStandFor(string filter, string topic, string wildcards) =>
        Assert.Equal(wildcards, string.Join('|', TopicFilter.Read(filter, out _)!.Match(topic)!));

    [Theory]
    [InlineData("a/b", "a/B")]
    [InlineData("a/+", "a/b/c")]
    [InlineData("a/+", "a")]
    [InlineData("#", "$SYS/broker/uptime")]
    [InlineData("+/broker", "$SYS/broker")]
    public void Others_DoNotMatch(string filter, string topic) => Assert.Null(TopicFilter.Read(filter, out _)!.Match(topic));

    [Theory]
    [InlineData("")]
    [InlineData("a+")]
    [InlineData("a/#/b")]
    [InlineData("a/b#")]
    [InlineData("$share/group/a")]
    [InlineData("a\u0000")]
    public void Wrong_IsToldWhy(string filter)
    {
        Assert.Null(TopicFilter.Read(filter, out string? wrong));
        Assert.NotEmpty(wrong!);
    }

    [Theory]
    [InlineData("{1}.{2}", "N1.PT-2")]
    [InlineData("{2}", "PT-2")]
    [InlineData("x-{topic}", "x-plant/N1/PT-2/pv")]
    [InlineData("fixed", "fixed")]
    public void Template_MakesTheName(string template, string name)
    {
        TopicFilter filter = TopicFilter.Read("plant/+/+/pv", out _)!;
        SignalName signal = SignalName.Read(template, filter.Wildcards, withMember: false, out _)!;
        Assert.Equal(name, signal.Of("plant/N1/PT-2/pv", filter.Match("plant/N1/PT-2/pv")!, ""));
    }

    [Theory]
    [InlineData("{3}")]
    [InlineData("{0}")]
    [InlineData("{member}")]
    [InlineData("{1")]
    [InlineData("")]
    public void WrongTemplate_IsToldWhatIsAllowed(string template)
    {
        Assert.Null(SignalName.Read(template, 2, withMember: false, out string? wrong));
        Assert.Contains("allowed", wrong, StringComparison.Ordinal);
    }
}
