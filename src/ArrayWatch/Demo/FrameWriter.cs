using System.Formats.Cbor;
using System.Runtime.InteropServices;

namespace ArrayWatch.Demo;

/// <summary>Writes a snapshot frame as a publisher would: one CBOR map (RFC 8949), data as a float32 typed array (RFC 8746).</summary>
internal static class FrameWriter
{
    private const CborTag BigEndianFloat32 = (CborTag)81, LittleEndianFloat32 = (CborTag)85;

    /// <summary>Writes one frame.</summary>
    /// <param name="timeSeconds">Of the first snapshot, seconds since 1970.</param>
    /// <param name="sequence">Counts frames.</param>
    /// <param name="intervalSeconds">From one snapshot to the next.</param>
    /// <param name="frequencies">Bin centres, Hz.</param>
    /// <param name="shape">[K, F, N].</param>
    /// <param name="data">2·K·F·N values.</param>
    public static byte[] Write(
        double timeSeconds, ulong sequence, double intervalSeconds, IReadOnlyList<double> frequencies, IReadOnlyList<int> shape, ReadOnlySpan<float> data)
    {
        CborWriter body = new();
        body.WriteStartMap(6);
        body.WriteTextString("time");
        body.WriteDouble(timeSeconds);
        body.WriteTextString("sequence");
        body.WriteUInt64(sequence);
        body.WriteTextString("interval");
        body.WriteDouble(intervalSeconds);
        body.WriteTextString("frequencies");
        body.WriteStartArray(frequencies.Count);
        foreach (double frequency in frequencies) body.WriteDouble(frequency);
        body.WriteEndArray();
        body.WriteTextString("shape");
        body.WriteStartArray(shape.Count);
        foreach (int length in shape) body.WriteInt32(length);
        body.WriteEndArray();
        body.WriteTextString("data");
        body.WriteTag(BitConverter.IsLittleEndian ? LittleEndianFloat32 : BigEndianFloat32);
        body.WriteByteString(MemoryMarshal.AsBytes(data));
        body.WriteEndMap();
        return body.Encode();
    }
}
