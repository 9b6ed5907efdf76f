namespace ArrayWatch.Simulation.Levels;

/// <summary>A change from one level to another, straight in decibels: 12 dB over minutes, say.</summary>
/// <param name="StartSeconds">Scene time at which it begins.</param>
/// <param name="DurationSeconds">How long it takes, positive.</param>
/// <param name="ChangeDecibels">Level after it, dB re the level before.</param>
public sealed record Ramp(double StartSeconds, double DurationSeconds, double ChangeDecibels) : ILevelCurve
{
    /// <inheritdoc/>
    public double DecibelsAt(double sceneSeconds) =>
        ChangeDecibels * Math.Clamp((sceneSeconds - StartSeconds) / DurationSeconds, 0, 1);
}
