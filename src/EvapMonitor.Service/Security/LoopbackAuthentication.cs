using System.Net;
using System.Security.Claims;
using System.Text.Encodings.Web;
using Microsoft.AspNetCore.Authentication;
using Microsoft.Extensions.Options;

namespace EvapMonitor.Service.Security;

/// <summary>Who counts as this machine.</summary>
/// <param name="InContainer">True inside a container, where what comes from the host arrives from a private address.</param>
public sealed record TrustedPeers(bool InContainer)
{
    /// <summary>True for the loopback, and inside a container for private addresses (RFC 1918, RFC 4193).</summary>
    public bool Accept(IPAddress remote)
    {
        if (remote.IsIPv4MappedToIPv6) remote = remote.MapToIPv4();
        if (IPAddress.IsLoopback(remote)) return true;
        if (!InContainer) return false;
        return remote.GetAddressBytes() is [10, ..] or [172, >= 16 and <= 31, ..] or [192, 168, _, _] || remote.IsIPv6UniqueLocal;
    }
}

/// <summary>Whoever reaches the service over the machine's own loopback is its operator; nobody else is let in. Until accounts exist this is all the access there is.</summary>
internal sealed class LoopbackAuthentication(IOptionsMonitor<AuthenticationSchemeOptions> options, ILoggerFactory log, UrlEncoder encoder, TrustedPeers peers)
    : AuthenticationHandler<AuthenticationSchemeOptions>(options, log, encoder)
{
    public const string SchemeName = "Loopback";

    protected override Task<AuthenticateResult> HandleAuthenticateAsync()
    {
        // A test host in memory has no address: it is the same process.
        if (Context.Connection.RemoteIpAddress is { } remote && !peers.Accept(remote)) return Task.FromResult(AuthenticateResult.Fail("not the loopback"));
        var identity = new ClaimsIdentity([new Claim(ClaimTypes.Name, "this machine")], SchemeName);
        return Task.FromResult(AuthenticateResult.Success(new AuthenticationTicket(new ClaimsPrincipal(identity), SchemeName)));
    }
}
