using System.Formats.Cbor;
using System.Text;
using System.Text.Json.Nodes;
using ArrayWatch.Messaging.Inbound;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Tests.Messaging;

public sealed class SnapshotDecoderRefusalTests
{
    private readonly SnapshotDecoder _decoder = new();

    [Theory]
    [InlineData("time")]
    [InlineData("sequence")]
    [InlineData("interval")]
    [InlineData("frequencies")]
    [InlineData("shape")]
    [InlineData("data")]
    public void Names_the_key_that_is_missing(string key)
    {
        AssertRefused(new SnapshotMessage().Without(key).ToCbor(), RefusalReason.NotDecodable, $"lacks '{key}'");
        JsonObject json = SnapshotMessage.Json();
        json.Remove(key);
        AssertRefused(SnapshotMessage.Utf8(json), RefusalReason.NotDecodable, $"lacks '{key}'");
    }

    [Fact]
    public void Names_every_key_that_is_missing() =>
        AssertRefused("{\"time\":1}"u8, RefusalReason.NotDecodable, "lacks 'sequence', 'interval', 'frequencies', 'shape', 'data'");

    [Fact]
    public void Refuses_a_key_given_twice()
    {
        AssertRefused(new SnapshotMessage().Adding("sequence", static w => w.WriteInt32(3)).ToCbor(), RefusalReason.NotDecodable, "'sequence' is given twice");
        AssertRefused("{\"time\":1,\"time\":2}"u8, RefusalReason.NotDecodable, "'time' is given twice");
    }

    [Theory]
    [InlineData(2, 3, 3)]
    [InlineData(1, 3, 2)]
    [InlineData(2, 4, 2)]
    [InlineData(0, 3, 2)]
    [InlineData(2, 3, 0)]
    [InlineData(2_147_483_648, 3, 2)]
    [InlineData(2_147_483_647, 2_147_483_647, 2_147_483_647)]
    [InlineData(4_294_967_296, 4_294_967_296, 1)]
    public void Refuses_a_shape_that_the_data_do_not_fill(double snapshots, double bins, double channels) =>
        AssertRefused(new SnapshotMessage().With("shape", w => SnapshotMessage.Numbers(w, snapshots, bins, channels)).ToCbor(), RefusalReason.WrongShape, "'shape' is", "'shape' [");

    [Fact]
    public void Refuses_a_shape_of_two_or_four_numbers_and_of_the_greatest_integers()
    {
        AssertRefused(new SnapshotMessage().With("shape", static w => SnapshotMessage.Numbers(w, 6, 2)).ToCbor(), RefusalReason.WrongShape, "has 2 numbers");
        AssertRefused(new SnapshotMessage().With("shape", static w => SnapshotMessage.Numbers(w, 2, 3, 2, 1)).ToCbor(), RefusalReason.WrongShape, "has 4 numbers");
        AssertRefused(new SnapshotMessage().With("shape", static w =>
        {
            w.WriteStartArray(3);
            for (int i = 0; i < 3; i++) w.WriteUInt64(ulong.MaxValue);
            w.WriteEndArray();
        }).ToCbor(), RefusalReason.WrongShape, "at least 1", "'shape' is");
    }

    [Fact]
    public void Refuses_bytes_that_are_no_whole_elements()
    {
        AssertRefused(new SnapshotMessage().With("data", static w => SnapshotMessage.Typed(w, 85, new byte[97])).ToCbor(), RefusalReason.WrongShape, "97 bytes");
        AssertRefused(new SnapshotMessage().With("frequencies", static w => SnapshotMessage.Typed(w, 86, new byte[25])).ToCbor(), RefusalReason.WrongShape, "25 bytes");
    }

    [Theory]
    [InlineData(77UL, "tag 77")]
    [InlineData(80UL, "tag 80")]
    [InlineData(76UL, "tag 76")]
    [InlineData(87UL, "tag 87")]
    [InlineData(40UL, "tag 40")]
    public void Refuses_data_of_another_kind(ulong tag, string named) =>
        AssertRefused(new SnapshotMessage().With("data", w => SnapshotMessage.Typed(w, tag, new byte[96])).ToCbor(), RefusalReason.NotDecodable, named);

    [Fact]
    public void Refuses_plain_arrays_and_bare_byte_strings_as_CBOR_data()
    {
        AssertRefused(new SnapshotMessage().With("data", static w => SnapshotMessage.Numbers(w, 1, 2)).ToCbor(), RefusalReason.NotDecodable, "'data' holds an array");
        AssertRefused(new SnapshotMessage().With("data", static w => w.WriteByteString(new byte[96])).ToCbor(), RefusalReason.NotDecodable, "'data' holds a byte string");
    }

    [Fact]
    public void Refuses_byte_strings_and_keys_of_indefinite_length()
    {
        byte[] chunked = [0xD8, 85, 0x5F, 0x44, 0, 0, 0, 0, 0xFF];
        AssertRefused(new SnapshotMessage().With("data", w => w.WriteEncodedValue(chunked)).ToCbor(), RefusalReason.NotDecodable, "stated length");
        byte[] key = [0xA1, 0x7F, 0x64, .. "time"u8, 0xFF, 0x01];
        AssertRefused(key, RefusalReason.NotDecodable, "indefinite length");
    }

    [Theory]
    [InlineData("interval", 0.0)]
    [InlineData("interval", -1.0)]
    [InlineData("interval", double.NaN)]
    [InlineData("interval", double.PositiveInfinity)]
    [InlineData("overlap", 1.0)]
    [InlineData("overlap", -0.1)]
    [InlineData("overlap", double.NaN)]
    [InlineData("time", -1.0)]
    [InlineData("time", double.NaN)]
    [InlineData("time", 1e300)]
    public void Refuses_numbers_out_of_range(string key, double value) =>
        AssertRefused(new SnapshotMessage().With(key, w => w.WriteDouble(value)).ToCbor(), RefusalReason.NotDecodable, $"'{key}' is");

    [Fact]
    public void Refuses_a_sequence_that_is_no_unsigned_integer()
    {
        AssertRefused(new SnapshotMessage().With("sequence", static w => w.WriteInt32(-1)).ToCbor(), RefusalReason.NotDecodable, "'sequence' holds an integer");
        AssertRefused(new SnapshotMessage().With("sequence", static w => w.WriteDouble(1)).ToCbor(), RefusalReason.NotDecodable, "'sequence' holds a floating-point number");
        AssertRefused("{\"sequence\":1.5}"u8, RefusalReason.NotDecodable, "'sequence'");
    }

    [Theory]
    [InlineData(100, 100, 200)]
    [InlineData(100, 50, 200)]
    [InlineData(-1, 50, 200)]
    [InlineData(1, 2, double.NaN)]
    public void Refuses_bin_centres_that_do_not_ascend(double a, double b, double c) =>
        AssertRefused(new SnapshotMessage().With("frequencies", w => SnapshotMessage.Numbers(w, a, b, c)).ToCbor(), RefusalReason.NotDecodable, "ascending");

    [Fact]
    public void Refuses_what_follows_the_message()
    {
        AssertRefused((byte[])[.. new SnapshotMessage().ToCbor(), 0], RefusalReason.NotDecodable, "1 bytes follow");
        AssertRefused((byte[])[.. SnapshotMessage.Utf8(SnapshotMessage.Json()), (byte)'x'], RefusalReason.NotDecodable, "well-formed JSON");
    }

    [Fact]
    public void Refuses_deep_nesting_without_following_it()
    {
        byte[] arrays = new byte[1_000_000];
        arrays.AsSpan().Fill(0x81);
        AssertRefused((byte[])[0xA1, 0x61, (byte)'x', .. arrays], RefusalReason.NotDecodable, "nested more than 16");
        AssertRefused(Encoding.UTF8.GetBytes("{\"x\":" + new string('[', 100_000)), RefusalReason.NotDecodable, "well-formed JSON");
    }

    [Fact]
    public void Says_where_a_body_is_broken()
    {
        AssertRefused("{\"time\":1,\n \"sequence\":x}"u8, RefusalReason.NotDecodable, "well-formed JSON at line 2, byte 13");
        AssertRefused([0xA1, 0x64, (byte)'t', (byte)'i', (byte)'m', (byte)'e', 0xFB, 0], RefusalReason.NotDecodable, "well-formed CBOR at byte 6");
    }

    [Theory]
    [InlineData("application/xml")]
    [InlineData("application/cbor-seq")]
    public void Refuses_other_content_types(string contentType)
    {
        Refusal? refusal = _decoder.Decode(new SnapshotMessage().ToCbor(), contentType, out _);
        Assert.Equal(RefusalReason.NotDecodable, refusal?.Reason);
        Assert.Contains(contentType, refusal!.Detail, StringComparison.Ordinal);
    }

    [Fact]
    public void The_content_type_decides_even_against_the_first_byte()
    {
        Assert.NotNull(_decoder.Decode(new SnapshotMessage().ToCbor(), "application/json", out _));
        Assert.NotNull(_decoder.Decode(SnapshotMessage.Utf8(SnapshotMessage.Json()), "application/cbor", out _));
    }

    [Fact]
    public void Refuses_an_empty_body_and_other_first_bytes()
    {
        AssertRefused([], RefusalReason.NotDecodable, "empty");
        AssertRefused([0x80], RefusalReason.NotDecodable, "0x80");
        AssertRefused([0xFF], RefusalReason.NotDecodable, "0xFF");
    }

    [Fact]
    public void Refuses_a_body_over_the_limit_and_takes_one_at_it()
    {
        byte[] body = new SnapshotMessage().ToCbor();
        Assert.Null(new SnapshotDecoder(body.Length).Decode(body, null, out _));
        Refusal? refusal = new SnapshotDecoder(body.Length - 1).Decode(body, null, out _);
        Assert.Equal(RefusalReason.TooLarge, refusal?.Reason);
        Assert.Contains("maxMessageBytes", refusal!.Detail, StringComparison.Ordinal);
    }

    [Fact]
    public void Refuses_text_times_without_an_offset()
    {
        AssertRefused(new SnapshotMessage().With("time", static w => { w.WriteTag((CborTag)0); w.WriteTextString("2026-05-01T04:12:30"); }).ToCbor(), RefusalReason.NotDecodable, "RFC 3339");
        AssertRefused("{\"time\":\"yesterday\\n\"}"u8, RefusalReason.NotDecodable, "RFC 3339");
    }

    private void AssertRefused(ReadOnlySpan<byte> body, RefusalReason reason, params string[] anyOf)
    {
        Refusal? refusal = _decoder.Decode(body.ToArray(), null, out _);
        Assert.NotNull(refusal);
        Assert.Equal(reason, refusal.Reason);
        Assert.True(anyOf.Any(part => refusal.Detail.Contains(part, StringComparison.Ordinal)), refusal.Detail);
        Assert.EndsWith(".", refusal.Detail, StringComparison.Ordinal);
    }
}
