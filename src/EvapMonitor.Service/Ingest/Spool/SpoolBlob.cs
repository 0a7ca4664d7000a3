using System.Buffers.Binary;
using System.Numerics;
using System.Text;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Service.Ingest.Spool;

/// <summary>
/// The binary form of what one commit of the spool holds. One byte of version; the names (signals and sources), each once; the batches, each with its source,
/// its readings as name, step in time from the reading before (zigzag), quality and value; last a CRC-32C of all before it. Counts and indices are LEB128.
/// </summary>
internal static class SpoolBlob
{
    private const byte Version = 1;
    private const byte NoValue = 0x80;

    public static byte[] Write(IReadOnlyList<IncomingBatch> batches)
    {
        var names = new Dictionary<string, int>(StringComparer.Ordinal);
        using var body = new MemoryStream();
        using var output = new BinaryWriter(body);
        output.Write7BitEncodedInt(batches.Count);
        long before = 0;
        foreach (IncomingBatch batch in batches)
        {
            output.Write7BitEncodedInt(IndexOf(names, batch.Source));
            output.Write7BitEncodedInt(batch.Readings.Count);
            foreach ((string signal, Reading reading) in batch.Readings)
            {
                output.Write7BitEncodedInt(IndexOf(names, signal));
                long step = reading.At - before;
                output.Write7BitEncodedInt64((step << 1) ^ (step >> 63));
                before = reading.At;
                bool absent = double.IsNaN(reading.Value);
                output.Write((byte)((byte)reading.Quality | (absent ? NoValue : 0)));
                if (!absent) output.Write(reading.Value);
            }
        }

        using var blob = new MemoryStream((int)body.Length + (names.Count * 24) + 16);
        using var whole = new BinaryWriter(blob);
        whole.Write(Version);
        whole.Write7BitEncodedInt(names.Count);
        foreach (string name in names.Keys) whole.Write(name);
        whole.Write(body.GetBuffer(), 0, (int)body.Length);
        whole.Flush();
        whole.Write(Checksum(blob.GetBuffer().AsSpan(0, (int)blob.Length)));
        whole.Flush();
        return blob.ToArray();
    }

    /// <summary>Reads a blob back.</summary>
    /// <exception cref="InvalidDataException">It is not what was written.</exception>
    public static IReadOnlyList<IncomingBatch> Read(byte[] blob)
    {
        if (blob.Length < 6 || BinaryPrimitives.ReadUInt32LittleEndian(blob.AsSpan(blob.Length - 4)) != Checksum(blob.AsSpan(0, blob.Length - 4)))
            throw new InvalidDataException("The checksum does not match.");
        if (blob[0] != Version) throw new InvalidDataException($"Version {blob[0]} is not known here.");
        using var input = new BinaryReader(new MemoryStream(blob, 1, blob.Length - 5, writable: false), Encoding.UTF8);
        try
        {
            string[] names = new string[input.Read7BitEncodedInt()];
            for (int i = 0; i < names.Length; i++) names[i] = input.ReadString();
            var batches = new IncomingBatch[input.Read7BitEncodedInt()];
            long at = 0;
            for (int i = 0; i < batches.Length; i++)
            {
                string source = names[input.Read7BitEncodedInt()];
                var readings = new IncomingReading[input.Read7BitEncodedInt()];
                for (int j = 0; j < readings.Length; j++)
                {
                    string signal = names[input.Read7BitEncodedInt()];
                    long step = input.Read7BitEncodedInt64();
                    at += (long)((ulong)step >> 1) ^ -(step & 1);
                    byte quality = input.ReadByte();
                    double value = (quality & NoValue) != 0 ? double.NaN : input.ReadDouble();
                    readings[j] = new IncomingReading(signal, new Reading(at, value, (Quality)(quality & ~NoValue)));
                }

                batches[i] = new IncomingBatch(source, readings);
            }

            return batches;
        }
        catch (Exception error) when (error is EndOfStreamException or FormatException or IndexOutOfRangeException or OverflowException)
        {
            throw new InvalidDataException("The content does not follow its form.", error);
        }
    }

    private static int IndexOf(Dictionary<string, int> names, string name)
    {
        if (names.TryGetValue(name, out int index)) return index;
        index = names.Count;
        names.Add(name, index);
        return index;
    }

    private static uint Checksum(ReadOnlySpan<byte> bytes)
    {
        uint crc = uint.MaxValue;
        for (; bytes.Length >= 8; bytes = bytes[8..]) crc = BitOperations.Crc32C(crc, BinaryPrimitives.ReadUInt64LittleEndian(bytes));
        foreach (byte one in bytes) crc = BitOperations.Crc32C(crc, one);
        return ~crc;
    }
}
