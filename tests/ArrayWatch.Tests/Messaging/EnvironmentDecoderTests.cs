using System.Formats.Cbor;
using System.Text;
using ArrayWatch.Messaging.Inbound;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Tests.Messaging;

public sealed class EnvironmentDecoderTests
{
    private readonly EnvironmentDecoder _decoder = new();

    [Fact]
    public void Reads_all_that_the_platform_says()
    {
        EnvironmentReading reading = Decoded("""
            {"time":"2026-05-01T04:12:30Z","soundSpeed":1497.5,"temperature":12,"salinity":35,"depth":40,
             "heading":271.5,"speed":2.5,"windSpeed":7,"vessel":{"name":"x"}}
            """);

        Assert.Equal(new EnvironmentReading
        {
            Time = new DateTimeOffset(2026, 5, 1, 4, 12, 30, TimeSpan.Zero),
            SoundSpeed = 1497.5,
            Temperature = 12,
            Salinity = 35,
            Depth = 40,
            Heading = 271.5,
            Speed = 2.5,
            WindSpeed = 7,
        }, reading);
    }

    [Fact]
    public void What_is_left_out_or_null_is_not_said()
    {
        Assert.Equal(new EnvironmentReading { Temperature = -1.5 }, Decoded("""{"temperature":-1.5,"soundSpeed":null}"""));
        Assert.Equal(new EnvironmentReading(), Decoded("{}"));
    }

    [Fact]
    public void Reads_a_CBOR_map_alike()
    {
        CborWriter writer = new();
        writer.WriteStartMap(3);
        writer.WriteTextString("time");
        writer.WriteInt64(1_777_608_750);
        writer.WriteTextString("depth");
        writer.WriteHalf((Half)12.5);
        writer.WriteTextString("speed");
        writer.WriteNull();
        writer.WriteEndMap();

        Assert.Null(_decoder.Decode(writer.Encode(), null, out EnvironmentReading? reading));
        Assert.Equal(new EnvironmentReading { Time = DateTimeOffset.FromUnixTimeSeconds(1_777_608_750), Depth = 12.5 }, reading);
    }

    [Theory]
    [InlineData("""{"soundSpeed":1.5}""", "between 100 and 10000 m/s")]
    [InlineData("""{"soundSpeed":1e999}""", "soundSpeed")]
    [InlineData("""{"temperature":285}""", "between -100 and 100 °C")]
    [InlineData("""{"depth":"deep"}""", "must be a number")]
    [InlineData("""{"depth":1,"depth":2}""", "given twice")]
    [InlineData("""{"time":"now"}""", "RFC 3339")]
    [InlineData("""[1]""", "neither")]
    [InlineData("""{"depth":1""", "well-formed JSON")]
    public void Refuses_what_cannot_be_and_says_why(string json, string why)
    {
        Refusal? refusal = _decoder.Decode(Encoding.UTF8.GetBytes(json), null, out EnvironmentReading? reading);

        Assert.Equal(RefusalReason.NotDecodable, refusal?.Reason);
        Assert.Contains(why, refusal!.Detail, StringComparison.Ordinal);
        Assert.Null(reading);
    }

    private EnvironmentReading Decoded(string json)
    {
        Assert.Null(_decoder.Decode(Encoding.UTF8.GetBytes(json), "application/json", out EnvironmentReading? reading));
        return reading!;
    }
}
