using System.Net;
using System.Security.Cryptography;
using System.Security.Cryptography.X509Certificates;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Tests.Support;
using MQTTnet;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

public class BrokerTlsTests(PostgresServer server)
{
    private static readonly DateTimeOffset Now = TimeProvider.System.GetUtcNow();

    [IngestFact]
    public async Task OwnAuthority_ClientCertificate_UserAndPassword_Connect()
    {
        using Authority authority = new("right");
        await using Mosquitto broker = await StartAsync(authority, "require_certificate true");
        string folder = TemporaryFolder.Create();
        await File.WriteAllTextAsync(Path.Combine(folder, "ca.pem"), authority.Pem, TestContext.Current.CancellationToken);
        (string certificate, string key) = authority.Issue("client", isServer: false);
        await File.WriteAllTextAsync(Path.Combine(folder, "client.pem"), certificate, TestContext.Current.CancellationToken);
        await File.WriteAllTextAsync(Path.Combine(folder, "client.key"), key, TestContext.Current.CancellationToken);
        await File.WriteAllTextAsync(Path.Combine(folder, "password"), "long enough\n", TestContext.Current.CancellationToken);
        await using IngestService service = await IngestService.StartAsync(
            await server.CreateDatabaseAsync(),
            Sources(broker, "\"user\": \"evap\", \"password-file\": \"password\", \"tls\": {\"ca\": \"ca.pem\", \"certificate\": \"client.pem\", \"key\": \"client.key\"},"),
            folder: folder);
        await Poll.UntilAsync("the connection", () => service.Sources.All[0].ConnectedSince is not null);
        using Publisher publisher = await Publisher.ConnectAsync(broker.Port, true, options => options.WithCredentials("evap", "long enough").WithTlsOptions(tls => tls
            .UseTls().WithTrustChain(authority.Chain).WithClientCertificates([Loaded(certificate, key)]).WithRevocationMode(X509RevocationMode.NoCheck)));
        await publisher.SendAsync("F.1", Publisher.Message(Now, 4));
        await service.StoredAsync(1);
    }

    [IngestTheory]
    [InlineData(true, "right word")]
    [InlineData(false, "wrong word")]
    public async Task WrongAuthorityOrPassword_IsToldAndNeverConnects(bool otherAuthority, string password)
    {
        using Authority right = new("right"), other = new("other");
        await using Mosquitto broker = await StartAsync(right, "");
        string folder = TemporaryFolder.Create();
        await File.WriteAllTextAsync(Path.Combine(folder, "ca.pem"), otherAuthority ? other.Pem : right.Pem, TestContext.Current.CancellationToken);
        await using IngestService service = await IngestService.StartAsync(
            await server.CreateDatabaseAsync(), Sources(broker, $"\"user\": \"evap\", \"password\": \"{password}\", \"tls\": {{\"ca\": \"ca.pem\"}},"), folder: folder);
        await Poll.UntilAsync("the failure told", () => service.Sources.All is [{ LastError: not null }]);
        SourceState state = service.Sources.All[0];
        Assert.Null(state.ConnectedSince);
        Assert.Contains(otherAuthority ? "certificate" : "NotAuthorized", state.LastError, StringComparison.OrdinalIgnoreCase);
        await Poll.UntilAsync("the notice", () => service.Notices.Standing.Any(notice => notice.Key == "source:gateway"));
        Assert.DoesNotContain(password, string.Concat(service.Notices.Standing), StringComparison.Ordinal);
    }

    private static string Sources(Mosquitto broker, string more) => BrokerSourceTests.Sources(broker, "5", """{"filter": "#", "message": "object"}""", more);

    private static X509Certificate2 Loaded(string certificate, string key) => X509Certificate2.CreateFromPem(certificate, key);

    private static async Task<Mosquitto> StartAsync(Authority authority, string more)
    {
        (string certificate, string key) = authority.Issue("broker", isServer: true);
        return await Mosquitto.StartAsync(
            $"""
             cafile FOLDER/ca.pem
             certfile FOLDER/broker.pem
             keyfile FOLDER/broker.key
             allow_anonymous false
             password_file FOLDER/users
             {more}
             """,
            ("ca.pem", authority.Pem), ("broker.pem", certificate), ("broker.key", key), ("users", $"evap:{Hashed("long enough")}\n"));
    }

    /// <summary>A password as mosquitto 2 keeps it: PBKDF2 with SHA-512 (mosquitto_passwd(1)).</summary>
    private static string Hashed(string password)
    {
        byte[] salt = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12];
        byte[] hash = Rfc2898DeriveBytes.Pbkdf2(password, salt, 101, HashAlgorithmName.SHA512, 64);
        return $"$7$101${Convert.ToBase64String(salt)}${Convert.ToBase64String(hash)}";
    }

    /// <summary>A certificate authority made for the test.</summary>
    private sealed class Authority : IDisposable
    {
        private readonly ECDsa _key = ECDsa.Create(ECCurve.NamedCurves.nistP256);
        private readonly X509Certificate2 _certificate;

        public Authority(string name)
        {
            var request = new CertificateRequest("CN=" + name, _key, HashAlgorithmName.SHA256);
            request.CertificateExtensions.Add(new X509BasicConstraintsExtension(true, false, 0, true));
            _certificate = request.CreateSelfSigned(Now.AddDays(-1), Now.AddDays(2));
        }

        public string Pem => _certificate.ExportCertificatePem();

        public X509Certificate2Collection Chain => [X509Certificate2.CreateFromPem(Pem)];

        public (string Certificate, string Key) Issue(string name, bool isServer)
        {
            using ECDsa key = ECDsa.Create(ECCurve.NamedCurves.nistP256);
            var request = new CertificateRequest("CN=" + name, key, HashAlgorithmName.SHA256);
            request.CertificateExtensions.Add(new X509EnhancedKeyUsageExtension([new Oid(isServer ? "1.3.6.1.5.5.7.3.1" : "1.3.6.1.5.5.7.3.2")], false));
            var names = new SubjectAlternativeNameBuilder();
            names.AddIpAddress(IPAddress.Loopback);
            request.CertificateExtensions.Add(names.Build());
            using X509Certificate2 issued = request.Create(_certificate, Now.AddHours(-1), Now.AddDays(1), RandomNumberGenerator.GetBytes(8));
            return (issued.ExportCertificatePem(), key.ExportPkcs8PrivateKeyPem());
        }

        public void Dispose()
        {
            _certificate.Dispose();
            _key.Dispose();
        }
    }
}
