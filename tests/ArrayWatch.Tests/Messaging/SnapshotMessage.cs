using System.Formats.Cbor;
using System.Runtime.InteropServices;
using System.Text;
using System.Text.Json.Nodes;

namespace ArrayWatch.Tests.Messaging;

/// <summary>A well-formed snapshot message of two snapshots, three bins and two channels, whose parts a test can replace, leave out or repeat.</summary>
internal sealed class SnapshotMessage
{
    public const double Time = 1_777_608_750.25;
    public static readonly double[] Frequencies = [100, 200.5, 300];
    public static readonly float[] Values = [.. Enumerable.Range(0, 2 * 2 * 3 * 2).Select(static i => i - 7.5f)];
    private readonly List<KeyValuePair<string, Action<CborWriter>>> _parts =
    [
        new("time", static w => w.WriteDouble(Time)),
        new("sequence", static w => w.WriteUInt64(41)),
        new("interval", static w => w.WriteDouble(0.125)),
        new("overlap", static w => w.WriteDouble(0.5)),
        new("frequencies", static w => Numbers(w, Frequencies)),
        new("shape", static w => Numbers(w, 2, 3, 2)),
        new("data", static w => Typed(w, 85, MemoryMarshal.AsBytes<float>(Values))),
    ];

    /// <summary>With one part written otherwise.</summary>
    public SnapshotMessage With(string key, Action<CborWriter> write)
    {
        int index = _parts.FindIndex(p => p.Key == key);
        if (index >= 0) _parts[index] = new(key, write);
        else _parts.Add(new(key, write));
        return this;
    }

    /// <summary>With one part more, even if it is there already.</summary>
    public SnapshotMessage Adding(string key, Action<CborWriter> write)
    {
        _parts.Add(new(key, write));
        return this;
    }

    public SnapshotMessage Without(string key)
    {
        _parts.RemoveAll(p => p.Key == key);
        return this;
    }

    public SnapshotMessage Reversed()
    {
        _parts.Reverse();
        return this;
    }

    public byte[] ToCbor(bool indefiniteLength = false)
    {
        CborWriter writer = new(CborConformanceMode.Lax);
        writer.WriteStartMap(indefiniteLength ? null : _parts.Count);
        foreach ((string key, Action<CborWriter> write) in _parts)
        {
            writer.WriteTextString(key);
            write(writer);
        }
        writer.WriteEndMap();
        return writer.Encode();
    }

    public static JsonObject Json() => new()
    {
        ["time"] = Time,
        ["sequence"] = 41,
        ["interval"] = 0.125,
        ["overlap"] = 0.5,
        ["frequencies"] = new JsonArray([.. Frequencies.Select(static f => JsonValue.Create(f))]),
        ["shape"] = new JsonArray(2, 3, 2),
        ["data"] = new JsonArray([.. Values.Select(static v => JsonValue.Create(v))]),
    };

    public static byte[] Utf8(JsonObject json) => Encoding.UTF8.GetBytes(json.ToJsonString());

    public static void Typed(CborWriter writer, ulong tag, ReadOnlySpan<byte> bytes)
    {
        writer.WriteTag((CborTag)tag);
        writer.WriteByteString(bytes);
    }

    public static void Numbers(CborWriter writer, params double[] numbers)
    {
        writer.WriteStartArray(numbers.Length);
        foreach (double number in numbers)
        {
            if (double.IsInteger(number) && number >= 0) writer.WriteUInt64((ulong)number);
            else writer.WriteDouble(number);
        }
        writer.WriteEndArray();
    }
}
