using System.Buffers.Binary;
using System.Formats.Cbor;
using System.Runtime.InteropServices;
using System.Text.Json.Nodes;
using ArrayWatch.Messaging.Inbound;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;

namespace ArrayWatch.Tests.Messaging;

public sealed class SnapshotDecoderTests
{
    private readonly SnapshotDecoder _decoder = new();

    [Theory]
    [InlineData(null)]
    [InlineData("application/cbor")]
    [InlineData("Application/CBOR; version=1")]
    public void Reads_every_field_of_a_CBOR_message(string? contentType)
    {
        Refusal? refusal = _decoder.Decode(new SnapshotMessage().ToCbor(), contentType, out SnapshotFrame frame);

        Assert.Null(refusal);
        AssertWhole(frame);
    }

    [Theory]
    [InlineData(null)]
    [InlineData("application/json")]
    public void Reads_every_field_of_a_JSON_message(string? contentType)
    {
        Refusal? refusal = _decoder.Decode(SnapshotMessage.Utf8(SnapshotMessage.Json()), contentType, out SnapshotFrame frame);

        Assert.Null(refusal);
        AssertWhole(frame);
    }

    [Fact]
    public void Views_little_endian_float32_where_they_lie()
    {
        byte[] body = new SnapshotMessage().ToCbor();

        Assert.Null(_decoder.Decode(body, null, out SnapshotFrame frame));

        Assert.True(body.AsSpan().Overlaps(MemoryMarshal.AsBytes(frame.Data)));
    }

    [Fact]
    public void Takes_keys_in_any_order_and_maps_of_indefinite_length()
    {
        Assert.Null(_decoder.Decode(new SnapshotMessage().Reversed().ToCbor(indefiniteLength: true), null, out SnapshotFrame frame));
        AssertWhole(frame);
    }

    [Fact]
    public void Ignores_keys_that_it_does_not_know()
    {
        SnapshotMessage message = new SnapshotMessage().With("vessel", static w =>
        {
            w.WriteStartMap(2);
            w.WriteInt32(1);
            w.WriteTag(CborTag.MimeMessage);
            w.WriteTextString("x");
            w.WriteTextString("y");
            w.WriteStartArray(null);
            w.WriteNull();
            w.WriteEndArray();
            w.WriteEndMap();
        });

        Assert.Null(_decoder.Decode(message.ToCbor(), null, out SnapshotFrame frame));
        AssertWhole(frame);

        JsonObject json = SnapshotMessage.Json();
        json.Insert(0, "vessel", new JsonObject { ["a"] = new JsonArray(1, "x", null) });
        Assert.Null(_decoder.Decode(SnapshotMessage.Utf8(json), null, out frame));
        AssertWhole(frame);
    }

    [Theory]
    [InlineData(81)]
    [InlineData(82)]
    [InlineData(85)]
    [InlineData(86)]
    public void Reads_float32_and_float64_in_both_byte_orders(int tag)
    {
        byte[] bytes = Encode(SnapshotMessage.Values, isDouble: tag is 82 or 86, isLittleEndian: tag > 83);
        SnapshotMessage message = new SnapshotMessage().With("data", w => SnapshotMessage.Typed(w, (ulong)tag, bytes));

        Assert.Null(_decoder.Decode(message.ToCbor(), null, out SnapshotFrame frame));

        AssertWhole(frame);
    }

    [Fact]
    public void Reads_a_complex_array_around_a_typed_array()
    {
        SnapshotMessage message = new SnapshotMessage().With("data", static w =>
        {
            w.WriteTag((CborTag)43001);
            SnapshotMessage.Typed(w, 85, MemoryMarshal.AsBytes<float>(SnapshotMessage.Values));
        });

        Assert.Null(_decoder.Decode(message.ToCbor(), null, out SnapshotFrame frame));
        AssertWhole(frame);
    }

    [Fact]
    public void Reads_frequencies_as_a_typed_array_of_any_kind()
    {
        byte[] bigEndian16Bit = [0, 100, 0, 200, 1, 44];
        SnapshotMessage message = new SnapshotMessage().With("frequencies", w => SnapshotMessage.Typed(w, 65, bigEndian16Bit));

        Assert.Null(_decoder.Decode(message.ToCbor(), null, out SnapshotFrame frame));
        Assert.Equal([100, 200, 300], frame.Frequencies.ToArray());
    }

    public static TheoryData<string, byte[]> Times => new()
    {
        { "tag 0", [0xC0, 0x77, .. "2026-05-01T04:12:30.25Z"u8] },
        { "tag 1, double", Written(static w => { w.WriteTag((CborTag)1); w.WriteDouble(SnapshotMessage.Time); }) },
        { "plain double", Written(static w => w.WriteDouble(SnapshotMessage.Time)) },
    };

    [Theory]
    [MemberData(nameof(Times))]
    public void Reads_time_by_tag_0_tag_1_or_as_a_number(string name, byte[] encoded)
    {
        SnapshotMessage message = new SnapshotMessage().With("time", w => w.WriteEncodedValue(encoded));

        Assert.True(_decoder.Decode(message.ToCbor(), null, out SnapshotFrame frame) is null, name);
        Assert.Equal(SnapshotMessage.Time, frame.TimeSeconds, 1e-6);
    }

    [Fact]
    public void Reads_time_as_an_integer_by_tag_1_the_example_of_RFC_8949()
    {
        // RFC 8949 (2020), appendix A: 1(1363896240) is 0xc11a514b67b0, which is 2013-03-21T20:04:00Z.
        byte[] integer = [0xC1, 0x1A, 0x51, 0x4B, 0x67, 0xB0];
        byte[] text = [0xC0, 0x74, .. "2013-03-21T20:04:00Z"u8];
        foreach (byte[] encoded in new[] { integer, text })
        {
            Assert.Null(_decoder.Decode(new SnapshotMessage().With("time", w => w.WriteEncodedValue(encoded)).ToCbor(), null, out SnapshotFrame frame));
            Assert.Equal(1_363_896_240, frame.TimeSeconds);
        }
    }

    [Fact]
    public void Reads_JSON_time_as_RFC_3339()
    {
        JsonObject json = SnapshotMessage.Json();
        json["time"] = "2026-05-01T06:12:30.25+02:00";

        Assert.Null(_decoder.Decode(SnapshotMessage.Utf8(json), null, out SnapshotFrame frame));
        Assert.Equal(SnapshotMessage.Time, frame.TimeSeconds, 1e-6);
    }

    [Fact]
    public void Overlap_is_none_when_left_out()
    {
        Assert.Null(_decoder.Decode(new SnapshotMessage().Without("overlap").ToCbor(), null, out SnapshotFrame frame));
        Assert.Equal(0, frame.Overlap);
    }

    [Fact]
    public void Lets_values_that_are_not_finite_pass_to_where_they_are_masked()
    {
        float[] values = [.. SnapshotMessage.Values];
        (values[3], values[4]) = (float.NaN, float.PositiveInfinity);
        SnapshotMessage message = new SnapshotMessage().With("data", w => SnapshotMessage.Typed(w, 85, MemoryMarshal.AsBytes<float>(values)));
        Assert.Null(_decoder.Decode(message.ToCbor(), null, out SnapshotFrame frame));
        Assert.Equal(values, frame.Data.ToArray());

        JsonObject json = SnapshotMessage.Json();
        json["data"]!.AsArray()[3] = null;
        Assert.Null(_decoder.Decode(SnapshotMessage.Utf8(json), null, out frame));
        Assert.True(float.IsNaN(frame.Data[3]));
    }

    [Fact]
    public void Reads_JSON_after_a_byte_order_mark_and_CBOR_after_its_self_description()
    {
        Assert.Null(_decoder.Decode((byte[])[0xEF, 0xBB, 0xBF, .. SnapshotMessage.Utf8(SnapshotMessage.Json())], null, out SnapshotFrame frame));
        AssertWhole(frame);
        Assert.Null(_decoder.Decode((byte[])[0xD9, 0xD9, 0xF7, .. new SnapshotMessage().ToCbor()], null, out frame));
        AssertWhole(frame);
    }

    [Fact]
    public void A_message_leaves_nothing_behind_for_the_next()
    {
        Assert.NotNull(_decoder.Decode(new SnapshotMessage().With("shape", static w => SnapshotMessage.Numbers(w, 2, 3, 3)).ToCbor(), null, out _));
        Assert.NotNull(_decoder.Decode("{}"u8.ToArray(), null, out _));
        Assert.Null(_decoder.Decode(SnapshotMessage.Utf8(SnapshotMessage.Json()), null, out SnapshotFrame frame));
        AssertWhole(frame);
        Assert.Null(_decoder.Decode(new SnapshotMessage().ToCbor(), null, out frame));
        AssertWhole(frame);
    }

    [Fact]
    public void A_CBOR_float32_message_costs_no_memory_on_the_heap()
    {
        byte[] values = new byte[2 * 4 * 16 * 64 * 64];
        double[] frequencies = [.. Enumerable.Range(1, 64).Select(static i => 10.0 * i)];
        byte[] body = new SnapshotMessage()
            .With("shape", static w => SnapshotMessage.Numbers(w, 16, 64, 64))
            .With("frequencies", w => SnapshotMessage.Numbers(w, frequencies))
            .With("data", w => SnapshotMessage.Typed(w, 85, values)).ToCbor();
        Assert.Null(_decoder.Decode(body, null, out _));

        long before = GC.GetAllocatedBytesForCurrentThread();
        for (int i = 0; i < 100; i++) _decoder.Decode(body, null, out _);
        long each = (GC.GetAllocatedBytesForCurrentThread() - before) / 100;

        Assert.True(each < 1024, $"{each} bytes a message of {body.Length}");
    }

    private static void AssertWhole(in SnapshotFrame frame)
    {
        Assert.Equal(SnapshotMessage.Time, frame.TimeSeconds, 1e-6);
        Assert.Equal(41UL, frame.Sequence);
        Assert.Equal(0.125, frame.IntervalSeconds);
        Assert.Equal(0.5, frame.Overlap);
        Assert.Equal(SnapshotMessage.Frequencies, frame.Frequencies.ToArray());
        Assert.Equal((2, 3, 2), (frame.Snapshots, frame.Bins, frame.Channels));
        Assert.Equal(SnapshotMessage.Values, frame.Data.ToArray());
    }

    private static byte[] Written(Action<CborWriter> write)
    {
        CborWriter writer = new();
        write(writer);
        return writer.Encode();
    }

    private static byte[] Encode(float[] values, bool isDouble, bool isLittleEndian)
    {
        int size = isDouble ? 8 : 4;
        byte[] bytes = new byte[values.Length * size];
        for (int i = 0; i < values.Length; i++)
        {
            Span<byte> target = bytes.AsSpan(i * size, size);
            if (isDouble) BinaryPrimitives.WriteDoubleLittleEndian(target, values[i]);
            else BinaryPrimitives.WriteSingleLittleEndian(target, values[i]);
            if (!isLittleEndian) target.Reverse();
        }
        return bytes;
    }
}
