using System.Text.Json;
using System.Text.Json.Serialization;

namespace ArrayWatch.Monitoring.Reports;

/// <summary>The one way in which reports become JSON: on the broker, over HTTP and in the store.</summary>
public static class ReportJson
{
    /// <summary>camelCase names, kebab-case enumerations, RFC 3339 times, null kept, non-finite numbers as null.</summary>
    public static JsonSerializerOptions Options { get; } = Create();

    /// <summary>UTF-8 bytes of a report.</summary>
    public static byte[] Write<T>(T report) => JsonSerializer.SerializeToUtf8Bytes(report, Options);

    private static JsonSerializerOptions Create()
    {
        JsonSerializerOptions o = new(JsonSerializerDefaults.Web) { WriteIndented = false };
        o.Converters.Add(new JsonStringEnumConverter(JsonNamingPolicy.KebabCaseLower));
        o.Converters.Add(new FiniteDoubleConverter());
        o.Converters.Add(new FiniteSingleConverter());
        o.MakeReadOnly(populateMissingResolver: true);
        return o;
    }

    private sealed class FiniteDoubleConverter : JsonConverter<double>
    {
        public override double Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options) =>
            reader.TokenType == JsonTokenType.Null ? double.NaN : reader.GetDouble();

        public override void Write(Utf8JsonWriter writer, double value, JsonSerializerOptions options)
        {
            if (double.IsFinite(value)) writer.WriteNumberValue(value);
            else writer.WriteNullValue();
        }
    }

    private sealed class FiniteSingleConverter : JsonConverter<float>
    {
        public override float Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options) =>
            reader.TokenType == JsonTokenType.Null ? float.NaN : reader.GetSingle();

        public override void Write(Utf8JsonWriter writer, float value, JsonSerializerOptions options)
        {
            if (float.IsFinite(value)) writer.WriteNumberValue(value);
            else writer.WriteNullValue();
        }
    }
}
