using System.Security.Cryptography.X509Certificates;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>An MQTT broker to take readings from, and how.</summary>
public sealed record BrokerSettings
{
    /// <summary>Name of the source, for people.</summary>
    public required string Name { get; init; }

    /// <summary>Host name or address.</summary>
    public required string Host { get; init; }

    /// <summary>Port. Default 1883, with TLS 8883.</summary>
    public required int Port { get; init; }

    /// <summary>True for MQTT 5, false for 3.1.1. Default 5.</summary>
    public bool IsVersion5 { get; init; } = true;

    /// <summary>Client identifier; the broker keeps the session under it, so it stays the same and is used by one program only. Default evapmonitor-NAME.</summary>
    public required string ClientId { get; init; }

    /// <summary>User name; null for none.</summary>
    public string? User { get; init; }

    /// <summary>Password; null for none. Never written to a log.</summary>
    public string? Password { get; init; }

    /// <summary>TLS; null for a plain connection.</summary>
    public BrokerTls? Tls { get; init; }

    /// <summary>How long the broker keeps the session while this program is away (MQTT 5). Default 7 days.</summary>
    public TimeSpan SessionExpiry { get; init; } = TimeSpan.FromDays(7);

    /// <summary>How messages are read; the first whose filter matches holds.</summary>
    public required IReadOnlyList<MessageRule> Topics { get; init; }

    /// <summary>Host and port.</summary>
    public string Address => Invariant($"{Host}:{Port}");

    /// <summary>Leaves out what is secret.</summary>
    public override string ToString() => $"{Name} at {Address}";
}

/// <summary>TLS towards a broker. Its certificate is always checked, name included.</summary>
/// <param name="Authorities">Who may have signed the broker's certificate; null trusts whom the machine trusts.</param>
/// <param name="Certificate">The client's own certificate with its key; null for none.</param>
public sealed record BrokerTls(X509Certificate2Collection? Authorities, X509Certificate2? Certificate);
