using System.Text.Json;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>Reads the file that names the brokers (docs/sources.md). Every mistake is told at once.</summary>
public static class SourceFile
{
    private static readonly JsonDocumentOptions Options = new() { CommentHandling = JsonCommentHandling.Skip, AllowTrailingCommas = true, MaxDepth = 16 };

    /// <summary>Reads the file.</summary>
    /// <param name="path">Its path; files that it names are relative to its folder.</param>
    /// <param name="problems">What is wrong, each in one line; empty when all is well.</param>
    public static IReadOnlyList<BrokerSettings> Read(string path, out IReadOnlyList<string> problems)
    {
        string name = Path.GetFileName(path);
        var found = new List<string>();
        problems = found;
        try
        {
            using JsonDocument document = JsonDocument.Parse(File.ReadAllText(path), Options);
            IReadOnlyList<BrokerSettings> brokers = ReadBrokers(document.RootElement, Path.GetDirectoryName(Path.GetFullPath(path))!, found);
            for (int i = 0; i < found.Count; i++) found[i] = $"{name}: {found[i]}";
            return found.Count == 0 ? brokers : [];
        }
        catch (JsonException error)
        {
            found.Add(Invariant($"{name}:{error.LineNumber + 1}:{error.BytePositionInLine + 1}: not JSON: {error.Message}"));
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            found.Add($"{name}: cannot be read: {error.Message}");
        }

        return [];
    }

    private static List<BrokerSettings> ReadBrokers(JsonElement root, string folder, List<string> problems)
    {
        var brokers = new List<BrokerSettings>();
        var file = new SettingsReader(root, "", problems, "brokers");
        if (root.ValueKind != JsonValueKind.Object) return brokers;
        foreach ((JsonElement element, string where) in file.Elements("brokers"))
        {
            if (ReadBroker(element, where, folder, problems) is not { } broker) continue;
            if (brokers.Any(other => other.Name == broker.Name)) problems.Add($"{where}.name: found \"{broker.Name}\" again; allowed: a name of its own for each broker.");
            brokers.Add(broker);
        }

        return brokers;
    }

    private static BrokerSettings? ReadBroker(JsonElement element, string where, string folder, List<string> problems)
    {
        var broker = new SettingsReader(
            element, where, problems, "name", "host", "port", "protocol", "client-id", "user", "password", "password-file", "tls", "session-expiry-days", "topics");
        if (element.ValueKind != JsonValueKind.Object) return null;
        string? name = broker.Text("name", required: true), host = broker.Text("host", required: true);
        BrokerTls? tls = broker.Find("tls") is { } given ? TlsFiles.Read(given, broker.Path("tls"), folder, problems) : null;
        int port = broker.Whole("port", broker.Has("tls") ? 8883 : 1883, 1, 65535);
        bool isVersion5 = broker.OneOf("protocol", "5", "3.1.1") == "5";
        string? clientId = broker.Text("client-id"), user = broker.Text("user");
        string? password = TlsFiles.Secret(broker, "password", "password-file", folder);
        if (user is null && password is not null) broker.Wrong("user", "missing beside a password", "the user that the password belongs to");
        int days = broker.Whole("session-expiry-days", 7, 1, 365);
        var topics = new List<MessageRule>();
        foreach ((JsonElement topic, string place) in broker.Elements("topics"))
        {
            if (RuleReader.Read(topic, place, problems) is { } rule) topics.Add(rule);
        }

        if (name is null || host is null) return null;
        return new BrokerSettings
        {
            Name = name, Host = host, Port = port, IsVersion5 = isVersion5, ClientId = clientId ?? "evapmonitor-" + name, User = user, Password = password, Tls = tls,
            SessionExpiry = TimeSpan.FromDays(days), Topics = topics,
        };
    }
}
