using System.Net;
using System.Security.Claims;
using System.Text.Encodings.Web;
using Microsoft.AspNetCore.Authentication;
using Microsoft.Extensions.Options;

namespace EvapMonitor.Service.Security;

/// <summary>Whoever reaches the service over the machine's own loopback is its operator; nobody else is let in. Until accounts exist this is all the access there is.</summary>
internal sealed class LoopbackAuthentication(IOptionsMonitor<AuthenticationSchemeOptions> options, ILoggerFactory log, UrlEncoder encoder)
    : AuthenticationHandler<AuthenticationSchemeOptions>(options, log, encoder)
{
    public const string SchemeName = "Loopback";

    protected override Task<AuthenticateResult> HandleAuthenticateAsync()
    {
        // A test host in memory has no address: it is the same process.
        if (Context.Connection.RemoteIpAddress is { } remote && !IPAddress.IsLoopback(remote)) return Task.FromResult(AuthenticateResult.Fail("not the loopback"));
        var identity = new ClaimsIdentity([new Claim(ClaimTypes.Name, "this machine")], SchemeName);
        return Task.FromResult(AuthenticateResult.Success(new AuthenticationTicket(new ClaimsPrincipal(identity), SchemeName)));
    }
}
