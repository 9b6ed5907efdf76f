using System.Text.Json;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Reads the fields of a JSON snapshot message.</summary>
internal static class JsonSnapshotReader
{
    public static void Read(ReadOnlySpan<byte> body, SnapshotFields fields)
    {
        Utf8JsonReader reader = JsonValues.EnterObject(body);
        while (JsonValues.NextProperty(ref reader))
        {
            SnapshotKeys key = SnapshotKeyNames.Parse(JsonValues.Unescaped(ref reader));
            fields.Meet(key);
            reader.Read();
            switch (key)
            {
                case SnapshotKeys.Time: fields.TimeSeconds = JsonValues.Time(ref reader, "time"); break;
                case SnapshotKeys.Sequence: fields.Sequence = JsonValues.Unsigned(ref reader, "sequence"); break;
                case SnapshotKeys.Interval: fields.IntervalSeconds = JsonValues.Number(ref reader, "interval"); break;
                case SnapshotKeys.Overlap: fields.Overlap = JsonValues.Number(ref reader, "overlap"); break;
                case SnapshotKeys.Frequencies: ReadFrequencies(ref reader, fields); break;
                case SnapshotKeys.Shape: ReadShape(ref reader, fields); break;
                case SnapshotKeys.Data: ReadData(ref reader, fields); break;
                default: reader.Skip(); break;
            }
        }
        JsonValues.Leave(ref reader);
    }

    private static void ReadFrequencies(ref Utf8JsonReader reader, SnapshotFields fields)
    {
        JsonValues.EnterArray(ref reader, "frequencies");
        while (reader.Read() && reader.TokenType != JsonTokenType.EndArray)
            fields.AddFrequency(JsonValues.Number(ref reader, "frequencies"));
    }

    private static void ReadShape(ref Utf8JsonReader reader, SnapshotFields fields)
    {
        JsonValues.EnterArray(ref reader, "shape");
        Span<long> shape = stackalloc long[3];
        int count = 0;
        for (; reader.Read() && reader.TokenType != JsonTokenType.EndArray; count++)
        {
            ulong length = JsonValues.Unsigned(ref reader, "shape");
            if (count < shape.Length) shape[count] = (long)Math.Min(length, long.MaxValue);
        }
        if (count != shape.Length)
            MessageRefusedException.WrongShape($"'shape' has {count} numbers; it must have three: [snapshots, bins, channels].");
        fields.SetShape(shape);
    }

    private static void ReadData(ref Utf8JsonReader reader, SnapshotFields fields)
    {
        JsonValues.EnterArray(ref reader, "data");
        while (reader.Read() && reader.TokenType != JsonTokenType.EndArray)
        {
            // JSON has no way to write a value that is not finite; publishers write null for it.
            fields.AddValue(reader.TokenType == JsonTokenType.Null ? float.NaN : (float)JsonValues.Number(ref reader, "data"));
        }
    }
}
