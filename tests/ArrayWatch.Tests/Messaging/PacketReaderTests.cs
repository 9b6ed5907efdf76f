using ArrayWatch.Messaging.Connection;

namespace ArrayWatch.Tests.Messaging;

public sealed class PacketReaderTests
{
    private const int Limit = 200_000;

    [Fact]
    public async Task Cuts_packets_of_every_size_however_the_stream_is_cut()
    {
        Random random = new(3);
        int[] sizes = [0, 1, 127, 128, 16_383, 16_384, 70_000, 5, 150_000, 2, 199_999, 0, 200_000, 33, 80_000, 80_000, 12];
        foreach (int chunk in new[] { 1, 7, 4096, 100_000, int.MaxValue })
        {
            byte[][] bodies = [.. sizes.Select(size => Bytes(random, size))];
            byte[] stream = [.. bodies.SelectMany(static (body, i) => Packet((byte)(0x30 | (i & 1)), body))];
            PacketReader reader = new(new ChunkedStream(stream, chunk), Limit, TimeProvider.System);
            for (int i = 0; i < bodies.Length; i++)
            {
                Assert.True(await reader.ReadAsync(CancellationToken.None));
                Assert.Equal(0x30 | (i & 1), reader.Flags);
                Assert.Equal(bodies[i].Length, reader.BodyBytes);
                Assert.True(reader.Body.Span.SequenceEqual(bodies[i]), $"body {i}, chunks of {chunk}");
            }
            Assert.False(await reader.ReadAsync(CancellationToken.None));
        }
    }

    [Fact]
    public async Task Takes_in_only_the_head_of_a_packet_over_the_limit_and_goes_on_behind_it()
    {
        Random random = new(4);
        byte[] large = Bytes(random, Limit + 50_000);
        byte[] small = Bytes(random, 10);
        PacketReader reader = new(new ChunkedStream([.. Packet(0x30, large), .. Packet(0x30, small)], 10_000), Limit, TimeProvider.System);

        Assert.True(await reader.ReadAsync(CancellationToken.None));
        Assert.Equal(large.Length, reader.BodyBytes);
        Assert.Equal(PacketReader.HeadBytes, reader.Body.Length);
        Assert.True(large.AsSpan().StartsWith(reader.Body.Span));
        Assert.True(await reader.ReadAsync(CancellationToken.None));
        Assert.Equal(small, reader.Body.ToArray());
    }

    [Fact]
    public async Task Knows_whether_the_next_packet_is_here()
    {
        byte[] stream = [.. Packet(0xD0, []), .. Packet(0xD0, []), 0x30, 5, 1, 2];
        PacketReader reader = new(new ChunkedStream(stream, int.MaxValue), Limit, TimeProvider.System);

        Assert.False(reader.HasPacket);
        Assert.True(await reader.ReadAsync(CancellationToken.None));
        Assert.True(reader.HasPacket);
        Assert.True(await reader.ReadAsync(CancellationToken.None));
        Assert.False(reader.HasPacket);
        Assert.False(await reader.ReadAsync(CancellationToken.None));
    }

    [Fact]
    public async Task A_length_of_five_bytes_is_a_breach_of_protocol()
    {
        PacketReader reader = new(new ChunkedStream([0x30, 0xFF, 0xFF, 0xFF, 0xFF, 0x01], int.MaxValue), Limit, TimeProvider.System);
        await Assert.ThrowsAsync<MqttProtocolException>(async () => await reader.ReadAsync(CancellationToken.None));
    }

    private static byte[] Bytes(Random random, int count)
    {
        byte[] bytes = new byte[count];
        random.NextBytes(bytes);
        return bytes;
    }

    private static byte[] Packet(byte flags, byte[] body)
    {
        List<byte> packet = [flags];
        int length = body.Length;
        do
        {
            packet.Add((byte)((length & 0x7F) | (length > 0x7F ? 0x80 : 0)));
            length >>= 7;
        }
        while (length > 0);
        return [.. packet, .. body];
    }

    /// <summary>Gives its bytes in pieces, as a network does.</summary>
    private sealed class ChunkedStream(byte[] bytes, int chunk) : MemoryStream(bytes)
    {
        public override async ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellationToken = default)
        {
            if (chunk > 1000) await Task.Yield();
            return Read(buffer.Span[..Math.Min(buffer.Length, chunk)]);
        }
    }
}
