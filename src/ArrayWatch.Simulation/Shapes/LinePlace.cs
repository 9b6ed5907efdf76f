using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Shapes;

/// <summary>Where a channel lies along a line from the first channel to the last.</summary>
internal static class LinePlace
{
    /// <summary>0 at the first channel, 1 at the last.</summary>
    public static double Fraction(ArrayGeometry geometry, int channel)
    {
        Position whole = geometry[geometry.Count - 1] - geometry[0];
        return whole.Length > 0 ? (geometry[channel] - geometry[0]).Dot(whole) / whole.Dot(whole) : 0;
    }
}
