namespace ArrayWatch.Messaging.Connection;

/// <summary>
/// Cuts a stream into MQTT packets in one buffer that is reused. A large packet is read straight to where it will be
/// used; small ones come many to a read. Bounded: the buffer grows to the largest packet allowed, and of a larger
/// one only the head is taken in.
/// </summary>
/// <remarks>For one reader at a time. It does not own the stream.</remarks>
internal sealed class PacketReader(Stream stream, int maxPacketBytes, TimeProvider time)
{
    /// <summary>A topic has at most 65 535 bytes, so that it and the packet identifier fit into the head.</summary>
    public const int HeadBytes = 72 * 1024;

    /// <summary>Packets above this are read alone, so that nothing of their successor has to be moved.</summary>
    private const int LargePacketBytes = 16 * 1024;

    private byte[] _buffer = GC.AllocateUninitializedArray<byte>(HeadBytes + 1024);
    private int _start, _end;
    private long _bytesToSkip;
    private long _quietSince = time.GetTimestamp();
    private volatile bool _waiting;

    /// <summary>First byte of the packet last read: type and flags.</summary>
    public byte Flags { get; private set; }

    /// <summary>What follows the fixed header; valid until the next read.</summary>
    public ReadOnlyMemory<byte> Body { get; private set; }

    /// <summary>Bytes of the whole body; more than <see cref="Body"/> has when the packet is over the limit.</summary>
    public int BodyBytes { get; private set; }

    /// <summary>How long it has been waiting for bytes; zero while it is not waiting.</summary>
    public TimeSpan Quiet => _waiting ? time.GetElapsedTime(Interlocked.Read(ref _quietSince)) : TimeSpan.Zero;

    /// <summary>True when the next packet is here already.</summary>
    public bool HasPacket =>
        _bytesToSkip == 0 && TryReadHeader(out int header, out int length) && _end - _start >= header + Taken(length);

    /// <summary>Reads the next packet.</summary>
    /// <returns>False when the other end has closed.</returns>
    /// <exception cref="MqttProtocolException">The bytes are no MQTT.</exception>
    public async ValueTask<bool> ReadAsync(CancellationToken cancellation)
    {
        if (!await SkipAsync(cancellation).ConfigureAwait(false)) return false;
        int header, length;
        while (!TryReadHeader(out header, out length))
        {
            MakeRoom(HeadBytes);
            if (!await FillAsync(_buffer.Length - _end, cancellation).ConfigureAwait(false)) return false;
        }
        int taken = Taken(length);
        MakeRoom(header + taken);
        while (_end - _start < header + taken)
        {
            int missing = header + taken - (_end - _start);
            int most = missing > LargePacketBytes || taken < length ? missing : _buffer.Length - _end;
            if (!await FillAsync(most, cancellation).ConfigureAwait(false)) return false;
        }
        Flags = _buffer[_start];
        Body = _buffer.AsMemory(_start + header, taken);
        BodyBytes = length;
        _start += header + taken;
        _bytesToSkip = length - taken;
        return true;
    }

    private int Taken(int length) => length <= maxPacketBytes ? length : Math.Min(length, HeadBytes);

    /// <summary>Lets the rest of a packet over the limit pass by.</summary>
    private async ValueTask<bool> SkipAsync(CancellationToken cancellation)
    {
        while (_bytesToSkip > 0)
        {
            if (_start == _end)
            {
                _start = _end = 0;
                if (!await FillAsync((int)Math.Min(_bytesToSkip, _buffer.Length), cancellation).ConfigureAwait(false)) return false;
            }
            int step = (int)Math.Min(_bytesToSkip, _end - _start);
            _start += step;
            _bytesToSkip -= step;
        }
        return true;
    }

    /// <summary>Room for so many bytes from <see cref="_start"/> on.</summary>
    private void MakeRoom(int bytes)
    {
        if (_start == _end) _start = _end = 0;
        if (_buffer.Length - _start >= bytes) return;
        byte[] target = _buffer.Length >= bytes ? _buffer : GC.AllocateUninitializedArray<byte>(bytes);
        _buffer.AsSpan(_start.._end).CopyTo(target);
        _end -= _start;
        _start = 0;
        _buffer = target;
    }

    private async ValueTask<bool> FillAsync(int most, CancellationToken cancellation)
    {
        Interlocked.Exchange(ref _quietSince, time.GetTimestamp());
        _waiting = true;
        int read = await stream.ReadAsync(_buffer.AsMemory(_end, most), cancellation).ConfigureAwait(false);
        _waiting = false;
        _end += read;
        return read > 0;
    }

    private bool TryReadHeader(out int header, out int length)
    {
        length = 0;
        int available = _end - _start;
        for (header = 1; header < 5; header++)
        {
            if (header >= available) return false;
            byte b = _buffer[_start + header];
            length |= (b & 0x7F) << (7 * (header - 1));
            if ((b & 0x80) == 0)
            {
                header++;
                return true;
            }
        }
        throw new MqttProtocolException("A packet's length has more than four bytes.");
    }
}
