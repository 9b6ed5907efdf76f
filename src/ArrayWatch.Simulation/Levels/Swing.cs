namespace ArrayWatch.Simulation.Levels;

/// <summary>A level that rises and falls as a sine.</summary>
/// <param name="PeriodSeconds">From crest to crest, positive.</param>
/// <param name="PeakToPeakDecibels">From trough to crest, dB.</param>
/// <param name="PhaseRadians">Phase at the scene's start.</param>
public sealed record Swing(double PeriodSeconds, double PeakToPeakDecibels, double PhaseRadians = 0) : ILevelCurve
{
    /// <inheritdoc/>
    public double DecibelsAt(double sceneSeconds) =>
        PeakToPeakDecibels / 2 * Math.Sin(PhaseRadians + (2 * Math.PI * sceneSeconds / PeriodSeconds));
}
