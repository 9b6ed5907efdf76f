using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Shapes;

/// <summary>How the array's true shape departs from the configured one over time. Immutable.</summary>
public interface IArrayShape
{
    /// <summary>Displacement of one sensor, metres.</summary>
    /// <param name="geometry">The configured array.</param>
    /// <param name="channel">0-based index.</param>
    /// <param name="sceneSeconds">Seconds since the scene's start.</param>
    Position DisplacementAt(ArrayGeometry geometry, int channel, double sceneSeconds);
}
