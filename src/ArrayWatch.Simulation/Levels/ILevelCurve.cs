namespace ArrayWatch.Simulation.Levels;

/// <summary>A level that changes with scene time. Immutable: the same time gives the same level.</summary>
public interface ILevelCurve
{
    /// <summary>Level at <paramref name="sceneSeconds"/> after the scene's start, dB.</summary>
    double DecibelsAt(double sceneSeconds);
}
