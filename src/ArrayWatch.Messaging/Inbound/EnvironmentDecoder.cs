using System.Formats.Cbor;
using System.Text.Json;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Turns the body of an environment message (JSON, or a CBOR map alike) into a reading, or into a stated refusal; no bytes make it throw.</summary>
/// <remarks>Immutable; safe from any thread.</remarks>
public sealed class EnvironmentDecoder
{
    private static readonly Quantity[] _quantities =
    [
        new("time", 0, 253_402_300_799, "s since 1970"),
        new("soundSpeed", 100, 10_000, "m/s"),
        new("temperature", -100, 100, "°C"),
        new("salinity", 0, 350, "PSU"),
        new("depth", -1_000, 12_000, "m"),
        new("heading", -360, 720, "degrees"),
        new("speed", -1_000, 1_000, "m/s"),
        new("windSpeed", 0, 200, "m/s"),
    ];

    private readonly int _maxMessageBytes;

    /// <param name="maxMessageBytes">Larger bodies are refused; positive.</param>
    public EnvironmentDecoder(int maxMessageBytes = MqttOptions.DefaultMaxMessageBytes)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(maxMessageBytes);
        _maxMessageBytes = maxMessageBytes;
    }

    /// <summary>Decodes one body. Unknown keys are ignored; null means that the platform does not say.</summary>
    /// <returns>Null when decoded; otherwise why not.</returns>
    public Refusal? Decode(ReadOnlyMemory<byte> body, string? contentType, out EnvironmentReading? reading)
    {
        reading = null;
        if (Decoding.CheckSize(body.Length, _maxMessageBytes) is { } tooLarge) return tooLarge;
        PayloadFormat? format = null;
        try
        {
            double?[] values = new double?[_quantities.Length];
            format = PayloadFormats.Resolve(contentType, body.Span);
            if (format == PayloadFormat.Cbor) ReadCbor(body, values);
            else ReadJson(body.Span, values);
            reading = ToReading(values);
            return null;
        }
        catch (Exception exception) when (Decoding.IsMalformed(exception))
        {
            return Decoding.ToRefusal(exception, format);
        }
    }

    private static void ReadCbor(ReadOnlyMemory<byte> body, double?[] values)
    {
        CborReader reader = new(body, CborConformanceMode.Lax);
        CborValues.EnterMap(reader);
        while (reader.PeekState() != CborReaderState.EndMap)
        {
            int index = Find(CborValues.ReadKey(reader).Span);
            if (index < 0 || reader.PeekState() == CborReaderState.Null) CborValues.Skip(reader);
            else if (index == 0) Set(values, index, CborValues.ReadTime(reader, "time"));
            else Set(values, index, CborValues.ReadNumber(reader, _quantities[index].Key));
        }
        CborValues.LeaveMap(reader);
    }

    private static void ReadJson(ReadOnlySpan<byte> body, double?[] values)
    {
        Utf8JsonReader reader = JsonValues.EnterObject(body);
        while (JsonValues.NextProperty(ref reader))
        {
            int index = Find(JsonValues.Unescaped(ref reader));
            reader.Read();
            if (index < 0 || reader.TokenType == JsonTokenType.Null) reader.Skip();
            else if (index == 0) Set(values, index, JsonValues.Time(ref reader, "time"));
            else Set(values, index, JsonValues.Number(ref reader, _quantities[index].Key));
        }
        JsonValues.Leave(ref reader);
    }

    private static int Find(ReadOnlySpan<byte> key)
    {
        for (int i = 0; i < _quantities.Length; i++)
            if (key.SequenceEqual(_quantities[i].Utf8)) return i;
        return -1;
    }

    private static void Set(double?[] values, int index, double value)
    {
        Quantity quantity = _quantities[index];
        if (values[index] is not null)
            MessageRefusedException.NotDecodable($"The key '{quantity.Key}' is given twice; give it once.");
        if (!(value >= quantity.Least && value <= quantity.Most))
            MessageRefusedException.NotDecodable($"'{quantity.Key}' is {value:R}; it must lie between {quantity.Least:R} and {quantity.Most:R} {quantity.Unit}.");
        values[index] = value;
    }

    private static EnvironmentReading ToReading(double?[] values) => new()
    {
        Time = values[0] is { } seconds ? DateTimeOffset.UnixEpoch.AddSeconds(seconds) : null,
        SoundSpeed = values[1],
        Temperature = values[2],
        Salinity = values[3],
        Depth = values[4],
        Heading = values[5],
        Speed = values[6],
        WindSpeed = values[7],
    };

    /// <summary>One key: what can physically be, so that a publisher's unit error does not turn the model.</summary>
    private sealed record Quantity(string Key, double Least, double Most, string Unit)
    {
        public byte[] Utf8 { get; } = System.Text.Encoding.UTF8.GetBytes(Key);
    }
}
