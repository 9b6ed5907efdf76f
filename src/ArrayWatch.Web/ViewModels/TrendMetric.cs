namespace ArrayWatch.Web.ViewModels;

/// <summary>A quantity that is kept over time.</summary>
/// <param name="Key">Its name in reports and addresses.</param>
/// <param name="Name">What people call it.</param>
/// <param name="Unit">Its unit; empty for none.</param>
/// <param name="PerChannel">True when every channel has one.</param>
/// <param name="IsDeviation">True when zero is the right value.</param>
internal sealed record TrendMetric(string Key, string Name, string Unit, bool PerChannel, bool IsDeviation)
{
    /// <summary>Those that every array has; a store may hold more.</summary>
    public static IReadOnlyList<TrendMetric> Known { get; } =
    [
        new("gainDecibels", "Gain error", "dB", true, true),
        new("phaseDegrees", "Phase error", "°", true, true),
        new("delayMicroseconds", "Time error", "µs", true, true),
        new("excessDecibels", "Excess noise", "dB", true, true),
        new("levelDecibels", "Level", "dB", true, false),
        new("misfit", "Field misfit", "", false, false),
        new("soundSpeed", "Sound speed", "m/s", false, false),
        new("degreesOfFreedom", "Degrees of freedom", "", false, false),
        new("conventionalGainLossDecibels", "Array gain lost, conventional", "dB", false, false),
        new("adaptiveGainLossDecibels", "Array gain lost, adaptive", "dB", false, false),
    ];

    /// <summary>The metric with that key; null when it is not one of <see cref="Known"/>.</summary>
    public static TrendMetric? Find(string? key) => Known.FirstOrDefault(m => m.Key == key);

    /// <summary>Name with unit, for an axis.</summary>
    public string Axis => Unit.Length == 0 ? Name : $"{Name}, {Unit}";
}
