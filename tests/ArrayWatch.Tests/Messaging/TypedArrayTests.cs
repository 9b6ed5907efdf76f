using ArrayWatch.Messaging.Inbound;

namespace ArrayWatch.Tests.Messaging;

public sealed class TypedArrayTests
{
    // RFC 8746 (2020), section 2, table of tags: element bytes, float, signed, little-endian.
    [Theory]
    [InlineData(64, 1, false, false, false)]
    [InlineData(65, 2, false, false, false)]
    [InlineData(66, 4, false, false, false)]
    [InlineData(67, 8, false, false, false)]
    [InlineData(68, 1, false, false, true)]
    [InlineData(69, 2, false, false, true)]
    [InlineData(70, 4, false, false, true)]
    [InlineData(71, 8, false, false, true)]
    [InlineData(72, 1, false, true, false)]
    [InlineData(73, 2, false, true, false)]
    [InlineData(74, 4, false, true, false)]
    [InlineData(75, 8, false, true, false)]
    [InlineData(77, 2, false, true, true)]
    [InlineData(78, 4, false, true, true)]
    [InlineData(79, 8, false, true, true)]
    [InlineData(80, 2, true, false, false)]
    [InlineData(81, 4, true, false, false)]
    [InlineData(82, 8, true, false, false)]
    [InlineData(84, 2, true, false, true)]
    [InlineData(85, 4, true, false, true)]
    [InlineData(86, 8, true, false, true)]
    public void Tags_mean_what_RFC_8746_says(int tag, int bytes, bool isFloat, bool isSigned, bool isLittleEndian)
    {
        Assert.True(TypedArray.TryFromTag((ulong)tag, out TypedArray array));
        Assert.Equal((bytes, isFloat, isSigned, isLittleEndian), (array.ElementBytes, array.IsFloat, array.IsSigned, array.IsLittleEndian));
    }

    // 76 is reserved; 83 and 87 are float128; 63 and 88 lie outside (RFC 8746, section 2).
    [Theory]
    [InlineData(63)]
    [InlineData(76)]
    [InlineData(83)]
    [InlineData(87)]
    [InlineData(88)]
    public void Other_tags_are_no_typed_array(int tag) => Assert.False(TypedArray.TryFromTag((ulong)tag, out _));

    // Bytes as an independent encoder writes them (cbor2 for Python, tag head left out), after RFC 8746, section 2.
    [Theory]
    [InlineData(85, new byte[] { 0x00, 0x00, 0x80, 0x3f, 0x00, 0x00, 0x20, 0xc0 }, new[] { 1, -2.5 })]
    [InlineData(81, new byte[] { 0x3f, 0x80, 0x00, 0x00, 0xc0, 0x20, 0x00, 0x00 }, new[] { 1, -2.5 })]
    [InlineData(86, new byte[] { 0x00, 0x00, 0x00, 0x00, 0x00, 0x00, 0xf0, 0x3f }, new[] { 1.0 })]
    [InlineData(82, new byte[] { 0x3f, 0xf0, 0x00, 0x00, 0x00, 0x00, 0x00, 0x00 }, new[] { 1.0 })]
    public void Floating_point_elements_have_their_value(int tag, byte[] bytes, double[] expected)
    {
        Assert.True(TypedArray.TryFromTag((ulong)tag, out TypedArray array));
        float[] singles = new float[expected.Length];
        double[] doubles = new double[expected.Length];
        array.ToSingles(bytes, singles);
        array.ToDoubles(bytes, doubles);
        Assert.Equal(expected, doubles);
        Assert.Equal(expected, singles.Select(static s => (double)s));
    }

    [Theory]
    [InlineData(77, new byte[] { 0x01, 0x00, 0xfe, 0xff }, new[] { 1.0, -2 })]
    [InlineData(73, new byte[] { 0x00, 0x01, 0xff, 0xfe }, new[] { 1.0, -2 })]
    [InlineData(78, new byte[] { 0xfe, 0xff, 0xff, 0xff }, new[] { -2.0 })]
    [InlineData(74, new byte[] { 0xff, 0xff, 0xff, 0xfe }, new[] { -2.0 })]
    [InlineData(64, new byte[] { 0, 255 }, new[] { 0.0, 255 })]
    [InlineData(72, new byte[] { 127, 128 }, new[] { 127.0, -128 })]
    [InlineData(67, new byte[] { 0, 0, 0, 0, 0, 0, 1, 0 }, new[] { 256.0 })]
    [InlineData(79, new byte[] { 0xff, 0xff, 0xff, 0xff, 0xff, 0xff, 0xff, 0xff }, new[] { -1.0 })]
    [InlineData(84, new byte[] { 0x00, 0x3c, 0x00, 0xc1 }, new[] { 1, -2.5 })]
    // RFC 8746 (2020), section 3.1, figure 1: the elements of the 16-bit big-endian example.
    [InlineData(65, new byte[] { 0x00, 0x02, 0x00, 0x04, 0x00, 0x08, 0x00, 0x04, 0x00, 0x10, 0x01, 0x00 }, new[] { 2.0, 4, 8, 4, 16, 256 })]
    public void Elements_of_other_kinds_have_their_value(int tag, byte[] bytes, double[] expected)
    {
        Assert.True(TypedArray.TryFromTag((ulong)tag, out TypedArray array));
        double[] doubles = new double[expected.Length];
        array.ToDoubles(bytes, doubles);
        Assert.Equal(expected, doubles);
    }

    [Fact]
    public void Doubles_are_rounded_to_nearest_at_every_length()
    {
        Assert.True(TypedArray.TryFromTag(86, out TypedArray array));
        Random random = new(7);
        for (int length = 0; length <= 35; length++)
        {
            double[] source = [.. Enumerable.Range(0, length).Select(_ => random.NextDouble() * Math.Pow(10, random.Next(-50, 60)))];
            float[] result = new float[length];
            array.ToSingles(System.Runtime.InteropServices.MemoryMarshal.AsBytes<double>(source), result);
            Assert.Equal(source.Select(static d => (float)d), result);
        }
    }
}
