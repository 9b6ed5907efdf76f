using System.Formats.Cbor;
using System.Runtime.InteropServices;
using System.Text;
using ArrayWatch.Messaging.Inbound;
using ArrayWatch.Signals;
using BenchmarkDotNet.Attributes;

namespace ArrayWatch.Benchmarks;

/// <summary>
/// Decoding one message of 64 channels, 64 bins and 16 snapshots. The baseline reads a CBOR array number by number, as a
/// straightforward reader does; the memory column shows that a typed array costs no memory of the payload's size.
/// </summary>
[MemoryDiagnoser]
public class DecodeBenchmarks
{
    private const int Channels = 64, Bins = 64, Snapshots = 16;
    private readonly SnapshotDecoder _decoder = new();
    private byte[] _plain = [], _single = [], _singleBigEndian = [], _double = [], _json = [];

    /// <summary>Writes the same frame in each form.</summary>
    [GlobalSetup]
    public void Write()
    {
        Random random = new(1);
        float[] values = new float[2 * Snapshots * Bins * Channels];
        for (int i = 0; i < values.Length; i++) values[i] = (float)(random.NextDouble() - 0.5);
        byte[] littleEndian = MemoryMarshal.AsBytes<float>(values).ToArray();
        byte[] bigEndian = [.. littleEndian];
        for (int i = 0; i < bigEndian.Length; i += 4) bigEndian.AsSpan(i, 4).Reverse();
        _single = Message(w => Typed(w, 85, littleEndian));
        _singleBigEndian = Message(w => Typed(w, 81, bigEndian));
        _double = Message(w => Typed(w, 86, MemoryMarshal.AsBytes<double>([.. values.Select(static v => (double)v)]).ToArray()));
        _plain = Message(w =>
        {
            w.WriteStartArray(values.Length);
            foreach (float value in values) w.WriteSingle(value);
            w.WriteEndArray();
        });
        _json = Encoding.UTF8.GetBytes(FormattableString.Invariant(
            $"{{\"time\":1777608750.25,\"sequence\":1,\"interval\":0.1,\"frequencies\":[{string.Join(',', Frequencies())}],\"shape\":[{Snapshots},{Bins},{Channels}],\"data\":[{string.Join(',', values.Select(static v => v.ToString("R", System.Globalization.CultureInfo.InvariantCulture)))}]}}"));
    }

    /// <summary>A plain CBOR array, number by number into a new array.</summary>
    [Benchmark(Baseline = true)]
    public float NumberByNumber()
    {
        CborReader reader = new(_plain);
        float[] values = [];
        int? keys = reader.ReadStartMap();
        for (int i = 0; i < keys; i++)
        {
            if (reader.ReadTextString() != "data")
            {
                reader.SkipValue();
                continue;
            }
            values = new float[reader.ReadStartArray() ?? 0];
            for (int k = 0; k < values.Length; k++) values[k] = reader.ReadSingle();
            reader.ReadEndArray();
        }
        return values[^1];
    }

    /// <summary>Float32 in the machine's order: read where it lies.</summary>
    [Benchmark]
    public float Float32() => Decode(_single);

    /// <summary>Float32 in the other order: converted.</summary>
    [Benchmark]
    public float Float32BigEndian() => Decode(_singleBigEndian);

    /// <summary>Float64: converted.</summary>
    [Benchmark]
    public float Float64() => Decode(_double);

    /// <summary>JSON.</summary>
    [Benchmark]
    public float Json() => Decode(_json);

    private float Decode(byte[] body)
    {
        if (_decoder.Decode(body, null, out SnapshotFrame frame) is { } refusal) throw new InvalidOperationException(refusal.Detail);
        return frame.Data[^1];
    }

    private static IEnumerable<double> Frequencies() => Enumerable.Range(0, Bins).Select(static i => 100.0 + 10 * i);

    private static void Typed(CborWriter writer, ulong tag, byte[] bytes)
    {
        writer.WriteTag((CborTag)tag);
        writer.WriteByteString(bytes);
    }

    private static byte[] Message(Action<CborWriter> data)
    {
        CborWriter w = new();
        w.WriteStartMap(6);
        w.WriteTextString("time");
        w.WriteDouble(1_777_608_750.25);
        w.WriteTextString("sequence");
        w.WriteInt32(1);
        w.WriteTextString("interval");
        w.WriteDouble(0.1);
        w.WriteTextString("frequencies");
        w.WriteStartArray(Bins);
        foreach (double frequency in Frequencies()) w.WriteDouble(frequency);
        w.WriteEndArray();
        w.WriteTextString("shape");
        w.WriteStartArray(3);
        foreach (int n in new[] { Snapshots, Bins, Channels }) w.WriteInt32(n);
        w.WriteEndArray();
        w.WriteTextString("data");
        data(w);
        w.WriteEndMap();
        return w.Encode();
    }
}
