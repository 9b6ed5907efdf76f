using System.Globalization;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>One alert in one short sentence that a person cannot misread.</summary>
internal static class AlertSentence
{
    /// <summary>What is wrong and where: "H12 and H18 carry each other's data".</summary>
    public static string Of(AlertEvent alert)
    {
        string who = Who(alert);
        return alert.Kind switch
        {
            "dead" => $"{who}: no signal",
            "gain" => $"{who}: amplitude {Estimate(alert, "gainDecibels", "dB", "wrong")}",
            "rolloff" => $"{who}: amplitude wrong by an amount that depends on frequency",
            "excess-noise" => $"{who}: {Estimate(alert, "excessDecibels", "dB", "more")} noise than the field explains",
            "polarity" => $"{who}: sign reversed",
            "phase" => $"{who}: phase off by {Estimate(alert, "phaseDegrees", "°", "more than tolerated")}",
            "delay" => $"{who}: {Delay(alert)}",
            "clock-drift" => $"{who}: clock drifts {Estimate(alert, "driftPartsPerMillion", "ppm", "")}",
            "swap" => Swap(alert, who),
            "crosstalk" => $"{who}: one leaks into the other",
            "coherent-interference" => $"{who}: {Interference(alert)}",
            "intermittent" => $"{who}: fault comes and goes",
            "saturation" => $"{who}: clipped at full scale",
            "stuck" => $"{who}: stuck at one value",
            "offset" => $"{who}: constant offset",
            "stream" => "Data stream disturbed or stopped",
            "geometry" => "The array is not where the configuration says",
            _ => $"{who}: {KindWords.Of(alert.Kind).Name}",
        };
    }

    /// <summary>The channels it is about: labels, at most four by name, or the group.</summary>
    public static string Who(AlertEvent alert) => alert switch
    {
        { Group: { Length: > 0 } group } => string.Create(CultureInfo.InvariantCulture, $"Group {group} ({alert.Channels.Count} channels)"),
        { Channels.Count: 0 } => "Whole array",
        { Channels.Count: 1 } => alert.Channels[0],
        { Channels.Count: <= 4 } => string.Join(", ", alert.Channels.Take(alert.Channels.Count - 1)) + " and " + alert.Channels[^1],
        _ => string.Create(CultureInfo.InvariantCulture, $"{string.Join(", ", alert.Channels.Take(3))} and {alert.Channels.Count - 3} more"),
    };

    private static string Swap(AlertEvent alert, string who) =>
        alert.Channels.Count == 2 ? $"{who} carry each other's data" : $"{who}: connected in the wrong order";

    private static string Delay(AlertEvent alert) => EstimateText.Number(alert.Estimate, "delayMicroseconds") is { } delay
        ? $"{NumberText.Plain(Math.Abs(delay), 0)} µs {(delay < 0 ? "early" : "late")}"
        : "early or late";

    private static string Interference(AlertEvent alert) => alert.Cause is { Length: > 0 } cause
        ? $"share interference that is no sound wave ({cause})"
        : "share interference that is no sound wave";

    private static string Estimate(AlertEvent alert, string key, string unit, string otherwise)
    {
        if (EstimateText.Number(alert.Estimate, key) is not { } value) return otherwise;
        return NumberText.Signed(value, unit is "°" or "ppm" ? 0 : 1) + (unit == "°" ? unit : " " + unit);
    }
}
