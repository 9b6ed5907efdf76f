using System.Formats.Cbor;
using System.Runtime.InteropServices;
using ArrayWatch.Demo;

namespace ArrayWatch.Tests.Programs;

public sealed class FrameWriterTests
{
    [Fact]
    public void A_frame_is_the_map_that_the_contract_asks_for()
    {
        float[] data = [1, 2, 3, 4, 5, 6, 7, 8];
        CborReader reader = new(FrameWriter.Write(1000.5, 7, 0.0625, [100, 200], [1, 2, 2], data));
        Assert.Equal(6, reader.ReadStartMap());
        Assert.Equal(("time", 1000.5), (reader.ReadTextString(), reader.ReadDouble()));
        Assert.Equal(("sequence", 7ul), (reader.ReadTextString(), reader.ReadUInt64()));
        Assert.Equal(("interval", 0.0625), (reader.ReadTextString(), reader.ReadDouble()));
        Assert.Equal("frequencies", reader.ReadTextString());
        Assert.Equal(2, reader.ReadStartArray());
        Assert.Equal((100.0, 200.0), (reader.ReadDouble(), reader.ReadDouble()));
        reader.ReadEndArray();
        Assert.Equal("shape", reader.ReadTextString());
        Assert.Equal(3, reader.ReadStartArray());
        Assert.Equal((1, 2, 2), (reader.ReadInt32(), reader.ReadInt32(), reader.ReadInt32()));
        reader.ReadEndArray();
        Assert.Equal("data", reader.ReadTextString());
        // RFC 8746, section 2.1: 85 is float32 little-endian, 81 big-endian.
        Assert.Equal(BitConverter.IsLittleEndian ? 85 : 81, (int)reader.ReadTag());
        Assert.Equal(data, MemoryMarshal.Cast<byte, float>(reader.ReadByteString()).ToArray());
        reader.ReadEndMap();
        Assert.Equal(0, reader.BytesRemaining);
    }
}
