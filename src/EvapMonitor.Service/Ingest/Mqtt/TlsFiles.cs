using System.Security.Cryptography;
using System.Security.Cryptography.X509Certificates;
using System.Text.Json;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>Reads the certificates and secrets that the sources file names, at the start, so that a wrong path is told then.</summary>
internal static class TlsFiles
{
    public static BrokerTls? Read(JsonElement element, string where, string folder, List<string> problems)
    {
        var tls = new SettingsReader(element, where, problems, "ca", "certificate", "key", "certificate-password", "certificate-password-file");
        if (element.ValueKind != JsonValueKind.Object) return null;
        string? ca = tls.Text("ca"), certificate = tls.Text("certificate"), key = tls.Text("key");
        string? password = Secret(tls, "certificate-password", "certificate-password-file", folder);
        if (certificate is null && (key is not null || password is not null)) tls.Wrong("certificate", "missing beside its key or password", "a PEM or PKCS #12 file");
        return new BrokerTls(
            ca is null ? null : Loaded(tls, "ca", ca, () =>
            {
                var all = new X509Certificate2Collection();
                all.ImportFromPemFile(Path.Combine(folder, ca));
                return all.Count > 0 ? all : throw new CryptographicException("there is no certificate in it");
            }),
            certificate is null ? null : Loaded(tls, "certificate", certificate, () => Load(Path.Combine(folder, certificate), key is null ? null : Path.Combine(folder, key), password)));
    }

    /// <summary>A secret, given as it is or by a file of which the first line counts.</summary>
    public static string? Secret(SettingsReader settings, string name, string fileName, string folder)
    {
        string? secret = settings.Text(name);
        if (settings.Text(fileName) is not { } file) return secret;
        if (secret is not null) settings.Wrong(fileName, $"stands beside {name}", "one of the two");
        return Loaded(settings, fileName, file, () => File.ReadLines(Path.Combine(folder, file)).FirstOrDefault() is { Length: > 0 } line ? line : throw new IOException("its first line is empty"));
    }

    private static X509Certificate2 Load(string path, string? key, string? password)
    {
        X509Certificate2 certificate;
        if (X509Certificate2.GetCertContentType(path) == X509ContentType.Pkcs12) certificate = X509CertificateLoader.LoadPkcs12FromFile(path, password);
        else certificate = password is null ? X509Certificate2.CreateFromPemFile(path, key) : X509Certificate2.CreateFromEncryptedPemFile(path, password, key);
        return certificate.HasPrivateKey ? certificate : throw new CryptographicException("there is no private key beside it");
    }

    private static T? Loaded<T>(SettingsReader settings, string name, string file, Func<T> load)
        where T : class
    {
        try
        {
            return load();
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException or CryptographicException)
        {
            settings.Wrong(name, $"{file} cannot be used ({error.Message})", "a readable file of the right form");
            return null;
        }
    }
}
