using ArrayWatch.Messaging.Inbound;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;
using CsCheck;

namespace ArrayWatch.Tests.Messaging;

/// <summary>
/// No bytes make a decoder throw. The generators start from fixed values, so that a run is the same each time and there
/// are no false failures.
/// </summary>
public sealed class SnapshotDecoderFuzzTests
{
    private static readonly byte[][] _valid =
    [
        new SnapshotMessage().ToCbor(),
        new SnapshotMessage().Reversed().ToCbor(indefiniteLength: true),
        SnapshotMessage.Utf8(SnapshotMessage.Json()),
    ];

    private static readonly string?[] _contentTypes = [null, "application/cbor", "application/json"];
    private readonly SnapshotDecoder _snapshots = new(4096);
    private readonly EnvironmentDecoder _environment = new(4096);

    [Fact]
    public void Random_bytes_are_refused_and_never_throw() =>
        Each(1, 20_000, Gen.Byte.Array[0, 300], body => Assert.NotNull(Decode(body)));

    [Fact]
    public void Random_bytes_behind_a_map_header_never_throw() =>
        Each(2, 20_000, Gen.Select(Gen.Byte[0xA0, 0xBF], Gen.Byte.Array[0, 300], static (head, rest) => (byte[])[head, .. rest]), body => Decode(body));

    [Fact]
    public void Every_truncation_of_a_valid_message_is_refused()
    {
        foreach (byte[] message in _valid)
            for (int length = 0; length < message.Length; length++) Assert.NotNull(Decode(message[..length]));
    }

    [Fact]
    public void Mutations_of_valid_messages_never_throw() =>
        Each(3, 20_000, Mutated(), body => Decode(body));

    [Fact]
    public void Splices_of_valid_messages_never_throw() =>
        Each(4, 20_000, Gen.Select(Valid(), Valid(), Gen.Double.Unit, Gen.Double.Unit,
            static (a, b, cutA, cutB) => (byte[])[.. a.AsSpan(0, (int)(cutA * a.Length)), .. b.AsSpan((int)(cutB * b.Length))]), body => Decode(body));

    private static Gen<byte[]> Valid() => Gen.Int[0, _valid.Length - 1].Select(static i => _valid[i]);

    private static Gen<byte[]> Mutated() =>
        Gen.Select(Valid(), Gen.Select(Gen.Double.Unit, Gen.Byte).Array[1, 8], static (message, changes) =>
        {
            byte[] body = [.. message];
            foreach ((double place, byte value) in changes) body[(int)(place * body.Length)] = value;
            return body;
        });

    private Refusal? Decode(byte[] body)
    {
        Refusal? first = null;
        foreach (string? contentType in _contentTypes)
        {
            Refusal? refusal = _snapshots.Decode(body, contentType, out SnapshotFrame frame);
            if (refusal is null)
            {
                Assert.Equal(2L * frame.Snapshots * frame.Bins * frame.Channels, frame.Data.Length);
                Assert.True(frame.Snapshots > 0 && frame.Channels > 0 && frame.IntervalSeconds > 0);
            }
            else
            {
                Assert.False(string.IsNullOrWhiteSpace(refusal.Detail));
                Assert.True(frame.Data.IsEmpty);
            }
            if (contentType is null) first = refusal;
            _environment.Decode(body, contentType, out _);
        }
        return first;
    }

    private static void Each(uint start, int count, Gen<byte[]> generator, Action<byte[]> check)
    {
        PCG random = new(start, 20_260_501);
        for (int i = 0; i < count; i++) check(generator.Generate(random, null, out _));
    }
}
