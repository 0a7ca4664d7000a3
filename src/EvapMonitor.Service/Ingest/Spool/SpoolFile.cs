using Microsoft.Data.Sqlite;

namespace EvapMonitor.Service.Ingest.Spool;

/// <summary>What the drain takes out of the spool in one go.</summary>
/// <param name="LastId">Id of the last row read, damaged ones included; 0 when there was none.</param>
/// <param name="Bytes">Bytes of the rows.</param>
/// <param name="Readings">Number of readings.</param>
/// <param name="Batches">The batches, oldest first.</param>
/// <param name="Damaged">Ids of rows that could not be read.</param>
internal sealed record SpoolPortion(long LastId, long Bytes, int Readings, IReadOnlyList<IncomingBatch> Batches, IReadOnlyList<long> Damaged);

/// <summary>
/// The file of the spool: SQLite in write-ahead mode, synchronous FULL, so that a commit that returned is on disk. One thread writes; another reads through a
/// connection of its own.
/// </summary>
internal sealed class SpoolFile : IDisposable
{
    private const int MostDamagedKept = 1_000;
    private const long RowOverhead = 32;

    private readonly SqliteConnection _write;
    private readonly SqliteConnection _read;
    private readonly SqliteCommand _insert;
    private readonly SqliteParameter _insertId = new("$id", SqliteType.Integer);
    private readonly SqliteParameter _insertBlob = new("$blob", SqliteType.Blob);
    private long _lastId;
    private long _bytes;

    private SpoolFile(string path)
    {
        Path = path;
        // Pooled connections would keep the file open after this object is gone.
        string connection = new SqliteConnectionStringBuilder { DataSource = path, Pooling = false, DefaultTimeout = 30 }.ConnectionString;
        _write = new SqliteConnection(connection);
        _read = new SqliteConnection(connection);
        _insert = _write.CreateCommand();
        _insert.CommandText = "INSERT INTO batch (id, blob) VALUES ($id, $blob)";
        _insert.Parameters.AddRange([_insertId, _insertBlob]);
    }

    /// <summary>Path of the file.</summary>
    public string Path { get; }

    /// <summary>Bytes that wait.</summary>
    public long Bytes => Interlocked.Read(ref _bytes);

    /// <summary>Opens the spool, making it when absent.</summary>
    /// <param name="folder">Its folder.</param>
    /// <param name="setAside">Where a file that is not a sound database was moved to; null when all is well.</param>
    /// <exception cref="SqliteException">It can neither be opened nor made.</exception>
    public static SpoolFile Open(string folder, out string? setAside)
    {
        Directory.CreateDirectory(folder);
        string path = System.IO.Path.Combine(folder, "spool.db");
        setAside = null;
        try
        {
            return OpenAt(path);
        }
        catch (SqliteException error) when (error.SqliteErrorCode is SQLitePCL.raw.SQLITE_NOTADB or SQLitePCL.raw.SQLITE_CORRUPT)
        {
            // What it holds may still be rescued by hand; the readings to come must not wait for that.
            for (int n = 1; ; n++)
            {
                setAside = System.IO.Path.Combine(folder, $"damaged-{n}.db");
                if (!File.Exists(setAside)) break;
            }

            foreach (string end in new[] { "", "-wal", "-shm" })
            {
                if (File.Exists(path + end)) File.Move(path + end, setAside + end);
            }

            return OpenAt(path);
        }
    }

    /// <summary>Commits what came in and what may go. When it returns, it is on disk.</summary>
    /// <param name="blob">A new row; null for none.</param>
    /// <param name="damaged">Rows to set aside.</param>
    /// <param name="removeThrough">Rows up to this id go.</param>
    /// <param name="removedBytes">Bytes of those rows.</param>
    public void Commit(byte[]? blob, IReadOnlyList<long> damaged, long removeThrough, long removedBytes)
    {
        Execute(_write, "BEGIN IMMEDIATE");
        try
        {
            if (blob is not null)
            {
                (_insertId.Value, _insertBlob.Value) = (_lastId + 1, blob);
                _insert.ExecuteNonQuery();
            }

            foreach (long id in damaged) Execute(_write, "INSERT OR REPLACE INTO damaged (id, blob) SELECT id, blob FROM batch WHERE id = $id", id);
            if (damaged.Count > 0) Execute(_write, "DELETE FROM damaged WHERE id NOT IN (SELECT id FROM damaged ORDER BY id DESC LIMIT $id)", MostDamagedKept);
            if (removeThrough > 0) Execute(_write, "DELETE FROM batch WHERE id <= $id", removeThrough);
            Execute(_write, "COMMIT");
        }
        catch (SqliteException)
        {
            Undo();
            throw;
        }

        if (blob is not null) _lastId++;
        Interlocked.Add(ref _bytes, (blob is null ? 0 : blob.Length + RowOverhead) - removedBytes);
        if (removeThrough > 0) GiveBackSpace();
    }

    /// <summary>Reads rows after an id, oldest first, until they hold a number of readings.</summary>
    public SpoolPortion Read(long after, int readings)
    {
        using SqliteCommand command = _read.CreateCommand();
        command.CommandText = "SELECT id, blob FROM batch WHERE id > $after ORDER BY id";
        command.Parameters.AddWithValue("$after", after);
        using SqliteDataReader reader = command.ExecuteReader();
        var batches = new List<IncomingBatch>();
        var damaged = new List<long>();
        long last = 0, bytes = 0;
        int count = 0;
        while (count < readings && reader.Read())
        {
            last = reader.GetInt64(0);
            byte[] blob = reader.GetFieldValue<byte[]>(1);
            bytes += blob.Length + RowOverhead;
            try
            {
                IReadOnlyList<IncomingBatch> read = SpoolBlob.Read(blob);
                batches.AddRange(read);
                foreach (IncomingBatch batch in read) count += batch.Readings.Count;
            }
            catch (InvalidDataException)
            {
                damaged.Add(last);
            }
        }

        return new SpoolPortion(last, bytes, count, batches, damaged);
    }

    /// <summary>Number of rows set aside because they were damaged.</summary>
    public long CountDamaged()
    {
        using SqliteCommand command = _read.CreateCommand();
        command.CommandText = "SELECT count(*) FROM damaged";
        return (long)command.ExecuteScalar()!;
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _insert.Dispose();
        _read.Dispose();
        _write.Dispose();
    }

    private static SpoolFile OpenAt(string path)
    {
        var file = new SpoolFile(path);
        try
        {
            file._write.Open();
            // auto_vacuum counts only before the first table is made.
            Execute(file._write, "PRAGMA auto_vacuum = INCREMENTAL");
            Execute(file._write, "PRAGMA journal_mode = WAL");
            Execute(file._write, "PRAGMA synchronous = FULL");
            Execute(file._write, "PRAGMA journal_size_limit = 67108864");
            Execute(file._write, "CREATE TABLE IF NOT EXISTS batch (id INTEGER PRIMARY KEY, blob BLOB NOT NULL)");
            Execute(file._write, "CREATE TABLE IF NOT EXISTS damaged (id INTEGER PRIMARY KEY, blob BLOB NOT NULL)");
            file._read.Open();
            using SqliteCommand command = file._read.CreateCommand();
            command.CommandText =
                $"""
                 SELECT max(coalesce((SELECT max(id) FROM batch), 0), coalesce((SELECT max(id) FROM damaged), 0)),
                   (SELECT coalesce(sum(length(blob)) + {RowOverhead} * count(*), 0) FROM batch)
                 """;
            using SqliteDataReader reader = command.ExecuteReader();
            reader.Read();
            (file._lastId, file._bytes) = (reader.GetInt64(0), reader.GetInt64(1));
            return file;
        }
        catch
        {
            file.Dispose();
            throw;
        }
    }

    /// <summary>After a long backlog the file is mostly holes: give some of them back to the disk with each removal.</summary>
    private void GiveBackSpace()
    {
        using SqliteCommand command = _write.CreateCommand();
        command.CommandText = "PRAGMA freelist_count";
        if ((long)command.ExecuteScalar()! > 16_384) Execute(_write, "PRAGMA incremental_vacuum(2048)");
    }

    private void Undo()
    {
        try
        {
            Execute(_write, "ROLLBACK");
        }
        catch (SqliteException)
        {
            // Some errors end the transaction by themselves.
        }
    }

    private static void Execute(SqliteConnection connection, string statement, long? id = null)
    {
        using SqliteCommand command = connection.CreateCommand();
        command.CommandText = statement;
        if (id is not null) command.Parameters.AddWithValue("$id", id);
        command.ExecuteNonQuery();
    }
}
