using ArrayWatch.Detection;
using ArrayWatch.Detection.Beams;
using ArrayWatch.Monitoring;
using ArrayWatch.NoiseField;
using ArrayWatch.NoiseField.Media;
using ArrayWatch.Signals;

namespace ArrayWatch.Configuration;

/// <summary>Binds one element of <c>arrays</c>.</summary>
internal static class ArrayReader
{
    /// <summary>What an id may be, for messages.</summary>
    public const string IdRange = "1 to 64 letters, digits, '-', '_' or '.', other than 'service'";

    private const double FarthestMetres = 1e6;

    /// <summary>
    /// True for an id that can stand in a topic and in an address. The topic of <c>service</c> is the service's own.
    /// </summary>
    public static bool IsId(string text) =>
        text.Length is > 0 and <= 64 && text.All(static c => char.IsAsciiLetterOrDigit(c) || c is '-' or '_' or '.')
        && text is not ("service" or "." or "..");

    /// <summary>Reads an array; null when there is no geometry to go on with, which is noted.</summary>
    public static ArrayDefinition? Read(Section section, string id)
    {
        Medium medium = ReadMedium(section);
        ArrayGeometry? geometry = ReadGeometry(section);
        ArrayDefinition fallback = new() { Id = id, Geometry = geometry!, Medium = medium };
        (TimeSpan fast, TimeSpan slow) = Averaging(section.Child("averaging"), fallback);
        ArrayDefinition definition = fallback with
        {
            TimeConstant = fast,
            SlowTimeConstant = slow,
            FieldComponents = Components(section.Child("noiseField"), fallback.FieldComponents),
            Tolerances = ReadTolerances(section.Child("tolerances")),
            FalseAlertsPerMonth = section.Number("falseAlertsPerMonth", fallback.FalseAlertsPerMonth, 0.001, 1000, "alerts"),
            ConjugatePhase = section.Choice("phaseConvention", false, ("standard", false), ("conjugate", true)),
            LookDirections = LookDirections(section, geometry),
            SilenceLimit = TimeSpan.FromSeconds(section.Number("silenceLimit", fallback.SilenceLimit.TotalSeconds, 1, 86_400, "seconds")),
        };
        return geometry is null ? null : definition;
    }

    private static Medium ReadMedium(Section section)
    {
        const string Allowed = "exactly one of soundSpeed, seaWater, air";
        if (section.Child("medium") is not { } medium)
        {
            if (!section.Has("medium")) section.Fail("medium", $"is missing; give {Allowed}");
            return new Medium.Given(1500);
        }

        string[] given = [.. ((ReadOnlySpan<string>)["soundSpeed", "seaWater", "air"]).ToArray().Where(medium.Has)];
        if (given.Length != 1) medium.Fail($"gives {(given.Length == 0 ? "nothing" : string.Join(" and ", given))}; give {Allowed}");
        Medium result = new Medium.Given(medium.Number("soundSpeed", 1500, 100, 15_000, "m/s"));
        if (medium.Child("seaWater") is { } water)
        {
            Medium.SeaWater sea = new(
                water.Number("temperature", null, -2, 40, "°C"), water.Number("salinity", 35, 0, 42, "PSU"), water.Number("depth", 0, 0, 9700, "metres"));
            Try(water, () => SoundSpeed.SeaWater(sea.Temperature, sea.Salinity, sea.Depth));
            water.Close();
            result = sea;
        }

        if (medium.Child("air") is { } gas)
        {
            Medium.Air air = new(
                gas.Number("temperature", null, -50, 60, "°C"), gas.Number("humidity", 50, 0, 100, "percent"), gas.Number("pressure", 101.325, 20, 120, "kPa"));
            Try(gas, () => SoundSpeed.Air(air.Temperature, air.Humidity, air.Pressure));
            gas.Close();
            result = air;
        }

        medium.Close();
        return result;
    }

    /// <summary>Some combinations are out of range though each value is not.</summary>
    private static void Try(Section section, Func<double> soundSpeed)
    {
        try
        {
            _ = soundSpeed();
        }
        catch (ArgumentOutOfRangeException exception)
        {
            section.Fail(exception.Message.Split(" (Parameter", 2)[0]);
        }
    }

    private static ArrayGeometry? ReadGeometry(Section section)
    {
        bool isLine = section.Has("line"), isList = section.Has("channels");
        if (isLine == isList) section.Fail(isLine ? "has a line and channels; give one of them" : "has no channels; give line or channels");
        ArrayGeometry? line = section.Child("line") is { } l ? Line(l) : null;
        ArrayGeometry? list = isList ? ChannelReader.Read(section) : null;
        return line ?? list;
    }

    private static ArrayGeometry? Line(Section line)
    {
        int count = line.Whole("count", null, 2, ArrayGeometry.MaximumChannels, "channels");
        double spacing = line.Number("spacing", null, 0.0001, 100_000, "metres");
        double[] axis = line.Has("axis") ? line.Triple("axis", FarthestMetres, "a number") ?? [1, 0, 0] : [1, 0, 0];
        string prefix = line.Text("labelPrefix", "", static _ => true, "a text")!;
        int first = line.Whole("firstLabel", 1, 0, 1_000_000, "a number");
        int group = line.Whole("groupSize", 0, 0, ArrayGeometry.MaximumChannels, "channels (0 for no groups)");
        line.Close();
        Position direction = new(axis[0], axis[1], axis[2]);
        if (direction.Length > 0) return ArrayGeometry.UniformLine(count, spacing, direction, prefix, first, group);
        line.Fail("axis", "[0, 0, 0] is no direction; give the direction from the first channel to the last, as in [1, 0, 0]");
        return null;
    }

    private static (TimeSpan Fast, TimeSpan Slow) Averaging(Section? section, ArrayDefinition fallback)
    {
        if (section is null) return (fallback.TimeConstant, fallback.SlowTimeConstant);
        double fast = section.Number("timeConstant", fallback.TimeConstant.TotalSeconds, 0.1, 86_400, "seconds");
        double slow = section.Number("slowTimeConstant", Math.Max(fallback.SlowTimeConstant.TotalSeconds, 30 * fast), 1, 2_592_000, "seconds");
        if (slow <= fast) section.Fail("slowTimeConstant", FormattableString.Invariant($"{slow} is not above timeConstant, {fast}; give a longer time, thirty times as long is usual"));
        section.Close();
        return (TimeSpan.FromSeconds(fast), TimeSpan.FromSeconds(slow));
    }

    private static IReadOnlyList<string> Components(Section? section, IReadOnlyList<string> fallback)
    {
        if (section is null) return fallback;
        IReadOnlyList<string> components = section.Words("components", fallback, [.. FieldComponents.Names]);
        section.Close();
        return components;
    }

    private static Tolerances ReadTolerances(Section? section)
    {
        Tolerances fallback = new();
        if (section is null) return fallback;
        Tolerances tolerances = new()
        {
            GainDecibels = section.Number("gainDecibels", fallback.GainDecibels, 0.01, 60, "dB"),
            PhaseDegrees = section.Number("phaseDegrees", fallback.PhaseDegrees, 0.01, 89, "degrees"),
            DelayMicroseconds = section.Number("delayMicroseconds", fallback.DelayMicroseconds, 0.01, 10_000_000, "microseconds"),
            ExcessDecibels = section.Number("excessDecibels", fallback.ExcessDecibels, 0.01, 60, "dB"),
        };
        section.Close();
        return tolerances;
    }

    private static List<LookDirection> LookDirections(Section section, ArrayGeometry? geometry)
    {
        if (!section.Has("lookDirections")) return geometry is null ? [] : DefaultLookDirections.Of(geometry);
        List<LookDirection> directions = [];
        foreach (Section look in section.Children("lookDirections"))
        {
            string name = look.RequiredText("name", "what people call the direction");
            double azimuth = look.Number("azimuth", null, -360, 360, "degrees from x toward y");
            double elevation = look.Number("elevation", 0, -90, 90, "degrees from the xy-plane toward z");
            if (name.Length > 0 && directions.Exists(d => d.Name == name)) look.Fail("name", $"'{name}' is another direction's name too; each needs its own");
            directions.Add(new(name, azimuth, elevation));
            look.Close();
        }

        return directions;
    }
}
