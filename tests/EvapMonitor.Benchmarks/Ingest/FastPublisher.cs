using System.Buffers.Binary;
using System.Net.Sockets;
using System.Text;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>
/// Publishes at QoS 1 with little effort of its own (MQTT 3.1.1, packets written by hand), so that what is measured is the receiving side. The broker
/// acknowledges in order, so a count says all.
/// </summary>
internal sealed class FastPublisher : IDisposable
{
    private const int Window = 2_000;

    private readonly TcpClient _client = new() { NoDelay = true };
    private readonly NetworkStream _stream;
    private readonly SemaphoreSlim _room = new(Window);
    private readonly byte[] _packet = new byte[1024];
    private readonly Task _listening;
    private long _sent, _acknowledged;

    public FastPublisher(int port, string clientId)
    {
        _client.Connect("127.0.0.1", port);
        _stream = _client.GetStream();
        byte[] id = Encoding.UTF8.GetBytes(clientId);
        // CONNECT: protocol name and level 4, clean session, no keep-alive (MQTT 3.1.1, section 3.1).
        byte[] connect = [0x10, (byte)(12 + id.Length), 0, 4, (byte)'M', (byte)'Q', (byte)'T', (byte)'T', 4, 2, 0, 0, 0, (byte)id.Length, .. id];
        _stream.Write(connect);
        byte[] answer = new byte[4];
        _stream.ReadExactly(answer);
        if (answer[0] != 0x20 || answer[3] != 0) throw new InvalidOperationException("The broker refused the publisher.");
        _listening = Task.Factory.StartNew(Listen, TaskCreationOptions.LongRunning);
    }

    /// <summary>Messages that the broker has taken.</summary>
    public long Acknowledged => Interlocked.Read(ref _acknowledged);

    public long Sent => Interlocked.Read(ref _sent);

    /// <summary>Sends a message; waits while too many are unacknowledged. False when the broker is gone.</summary>
    public bool Send(string topic, string payload)
    {
        if (!_room.Wait(TimeSpan.FromSeconds(30)) || _listening.IsCompleted) return false;
        int length = 2 + topic.Length + 2 + payload.Length;
        int at = 0;
        _packet[at++] = 0x32;
        for (int left = length; ;)
        {
            byte digit = (byte)(left & 127);
            left >>= 7;
            _packet[at++] = (byte)(left > 0 ? digit | 128 : digit);
            if (left == 0) break;
        }

        BinaryPrimitives.WriteUInt16BigEndian(_packet.AsSpan(at), (ushort)topic.Length);
        at += 2;
        at += Encoding.ASCII.GetBytes(topic, _packet.AsSpan(at));
        BinaryPrimitives.WriteUInt16BigEndian(_packet.AsSpan(at), (ushort)((_sent % 65_000) + 1));
        at += 2;
        at += Encoding.ASCII.GetBytes(payload, _packet.AsSpan(at));
        _stream.Write(_packet, 0, at);
        Interlocked.Increment(ref _sent);
        return true;
    }

    /// <summary>Waits until the broker has taken all.</summary>
    public async Task SettleAsync()
    {
        while (Acknowledged < Sent && !_listening.IsCompleted) await Task.Delay(5);
    }

    public void Dispose()
    {
        _client.Dispose();
        _room.Dispose();
    }

    private void Listen()
    {
        byte[] buffer = new byte[4 * Window];
        int held = 0;
        try
        {
            while (true)
            {
                int read = _stream.Read(buffer, held, buffer.Length - held);
                if (read == 0) return;
                held += read;
                // PUBACK of 3.1.1: four bytes each.
                int whole = held / 4;
                Interlocked.Add(ref _acknowledged, whole);
                if (whole > 0) _room.Release(whole);
                Array.Copy(buffer, whole * 4, buffer, 0, held - (whole * 4));
                held -= whole * 4;
            }
        }
        catch (Exception error) when (error is IOException or ObjectDisposedException)
        {
            // Closed.
        }
    }
}
