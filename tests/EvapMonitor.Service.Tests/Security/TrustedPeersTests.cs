using System.Net;
using EvapMonitor.Service.Security;

namespace EvapMonitor.Service.Tests.Security;

public class TrustedPeersTests
{
    [Theory]
    [InlineData("127.0.0.1", true, true)]
    [InlineData("::1", true, true)]
    [InlineData("::ffff:127.0.0.1", true, true)]
    [InlineData("172.17.0.1", false, true)]
    [InlineData("::ffff:172.31.0.1", false, true)]
    [InlineData("10.1.2.3", false, true)]
    [InlineData("192.168.3.4", false, true)]
    [InlineData("fd00::1", false, true)]
    [InlineData("172.32.0.1", false, false)]
    [InlineData("203.0.113.9", false, false)]
    [InlineData("2001:db8::1", false, false)]
    public void Accept_IsTheLoopbackAndInAContainerPrivateAddresses(string remote, bool onMachine, bool inContainer)
    {
        Assert.Equal(onMachine, new TrustedPeers(false).Accept(IPAddress.Parse(remote)));
        Assert.Equal(inContainer, new TrustedPeers(true).Accept(IPAddress.Parse(remote)));
    }

    [Fact]
    public void ContainerSetting_OutsideAContainer_IsRefused()
    {
        if (File.Exists("/.dockerenv") || File.Exists("/run/.containerenv")) return;
        var options = new ServiceOptions { Data = Path.GetTempPath(), Listen = "http://0.0.0.0:8642", InContainer = true };
        Assert.Contains(options.Problems(), problem => problem.StartsWith("network:", StringComparison.Ordinal));
    }
}
