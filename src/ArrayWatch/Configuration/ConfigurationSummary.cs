using System.Globalization;
using ArrayWatch.Messaging;
using ArrayWatch.Monitoring;
using ArrayWatch.NoiseField.Media;
using ArrayWatch.Signals;

namespace ArrayWatch.Configuration;

/// <summary>Says in a few lines what a configuration describes, so that a person can see whether it is what they meant.</summary>
internal static class ConfigurationSummary
{
    /// <summary>The lines.</summary>
    public static IEnumerable<string> Of(ServiceConfiguration configuration)
    {
        MqttOptions broker = configuration.Broker;
        yield return Line($"The configuration is good: {configuration.Arrays.Count} {(configuration.Arrays.Count == 1 ? "array" : "arrays")}.");
        yield return broker.Embedded
            ? Line($"broker  in this process, port {broker.Port}, {(broker.EmbeddedOnAllAddresses ? "all addresses" : "this machine only")}, topics {broker.TopicPrefix}/…")
            : Line($"broker  {broker.Host}, port {broker.Port}{(broker.UseTls ? ", TLS" : "")}, topics {broker.TopicPrefix}/…");
        yield return Line($"store   {configuration.Store.Path}, metrics kept for {configuration.Store.RetentionDays} days");
        if (configuration.Influx is { } influx) yield return Line($"influx  {influx.Url}, bucket {influx.Bucket}");
        yield return configuration.WebUrl is { } web ? Line($"web     {web}") : "web     none";
        foreach (ArrayDefinition array in configuration.Arrays)
        {
            foreach (string line in Array(array)) yield return line;
        }
    }

    private static IEnumerable<string> Array(ArrayDefinition array)
    {
        ArrayGeometry geometry = array.Geometry;
        double speed = Speed(array.Medium);
        yield return "";
        yield return Line($"array {array.Id}");
        yield return Line($"  channels      {geometry.Count}, {geometry.Channels[0].Label} to {geometry.Channels[^1].Label}{Groups(geometry)}");
        yield return Line($"  aperture      {geometry.ApertureMetres:0.###} m, smallest spacing {geometry.SmallestSpacingMetres:0.###} m");
        yield return Line($"  sound speed   {speed:0.0} m/s ({Origin(array.Medium)})");
        yield return geometry.SmallestSpacingMetres > 0
            ? Line($"  half a wavelength is the smallest spacing at {speed / (2 * geometry.SmallestSpacingMetres):0.#} Hz, the aperture at {speed / (2 * geometry.ApertureMetres):0.##} Hz")
            : "  two channels share a place";
        yield return Line($"  memory        {array.TimeConstant.TotalSeconds:0.###} s, slow {array.SlowTimeConstant.TotalSeconds:0.###} s");
        yield return Line($"  noise field   {string.Join(", ", array.FieldComponents)}");
        yield return Line($"  tolerances    {array.Tolerances.GainDecibels} dB, {array.Tolerances.PhaseDegrees}°, {array.Tolerances.DelayMicroseconds} µs, excess {array.Tolerances.ExcessDecibels} dB; {array.FalseAlertsPerMonth} false alerts a month");
        yield return Line($"  beams         {string.Join("; ", array.LookDirections.Select(static d => Line($"{d.Name} ({d.AzimuthDegrees:0.#}°, {d.ElevationDegrees:0.#}°)")))}");
    }

    private static string Groups(ArrayGeometry geometry)
    {
        int groups = geometry.Channels.Select(static c => c.Group).OfType<string>().Distinct().Count();
        return groups == 0 ? ", no groups" : Line($", in {groups} {(groups == 1 ? "group" : "groups")}");
    }

    private static double Speed(Medium medium) => medium switch
    {
        Medium.SeaWater sea => SoundSpeed.SeaWater(sea.Temperature, sea.Salinity, sea.Depth),
        Medium.Air air => SoundSpeed.Air(air.Temperature, air.Humidity, air.Pressure),
        _ => ((Medium.Given)medium).SoundSpeed,
    };

    private static string Origin(Medium medium) => medium switch
    {
        Medium.SeaWater sea => Line($"sea water of {sea.Temperature} °C, {sea.Salinity} PSU, {sea.Depth} m deep"),
        Medium.Air air => Line($"air of {air.Temperature} °C, {air.Humidity} % humidity, {air.Pressure} kPa"),
        _ => "as given",
    };

    private static string Line(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);
}
