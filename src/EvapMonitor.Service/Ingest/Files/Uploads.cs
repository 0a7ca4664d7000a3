using System.Security.Cryptography;

namespace EvapMonitor.Service.Ingest.Files;

/// <summary>A file that lies on disk.</summary>
/// <param name="Path">Where.</param>
/// <param name="Sha256">SHA-256, lower-case hexadecimal.</param>
/// <param name="Bytes">Its size.</param>
public sealed record StoredUpload(string Path, string Sha256, long Bytes);

/// <summary>Keeps uploads until they are imported. What is returned is on disk.</summary>
public sealed class Uploads
{
    /// <summary>Largest upload, bytes.</summary>
    public const long Largest = 4L << 30;

    private readonly string _folder;

    /// <summary>Prepares the folder and clears halves of uploads that a killed program left.</summary>
    public Uploads(string folder)
    {
        _folder = Directory.CreateDirectory(folder).FullName;
        foreach (string half in Directory.GetFiles(_folder, "*.part")) File.Delete(half);
    }

    /// <summary>Removes the uploads that no import knows: a program killed between storing and noting leaves one.</summary>
    public void RemoveAllBut(IReadOnlyList<string> needed)
    {
        HashSet<string?> names = [.. needed.Select(System.IO.Path.GetFileName)];
        foreach (string upload in Directory.GetFiles(_folder, "*.upload"))
        {
            if (!names.Contains(System.IO.Path.GetFileName(upload))) File.Delete(upload);
        }
    }

    /// <summary>Stores a body.</summary>
    public async Task<StoredUpload> StoreAsync(Stream body, CancellationToken stop)
    {
        string name = Guid.NewGuid().ToString("N"), part = System.IO.Path.Combine(_folder, name + ".part"), path = System.IO.Path.Combine(_folder, name + ".upload");
        try
        {
            using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
            long bytes = 0;
            await using (var file = new FileStream(part, FileMode.CreateNew, FileAccess.Write, FileShare.None, 1 << 16, FileOptions.Asynchronous))
            {
                byte[] buffer = new byte[1 << 16];
                int read;
                while ((read = await body.ReadAsync(buffer, stop)) > 0)
                {
                    hash.AppendData(buffer, 0, read);
                    await file.WriteAsync(buffer.AsMemory(0, read), stop);
                    bytes += read;
                }

                file.Flush(flushToDisk: true);
            }

            File.Move(part, path);
            return new StoredUpload(path, Convert.ToHexStringLower(hash.GetHashAndReset()), bytes);
        }
        catch
        {
            File.Delete(part);
            throw;
        }
    }
}
