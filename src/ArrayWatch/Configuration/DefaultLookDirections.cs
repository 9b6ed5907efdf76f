using ArrayWatch.Detection.Beams;
using ArrayWatch.Signals;

namespace ArrayWatch.Configuration;

/// <summary>Where beams are looked at when the configuration does not say.</summary>
internal static class DefaultLookDirections
{
    private const double CollinearShare = 1e-3;

    /// <summary>
    /// For a line: broadside and both endfires, named after the channel at that end; for any other array: the four quarters of
    /// the horizon.
    /// </summary>
    public static List<LookDirection> Of(ArrayGeometry geometry) => Axis(geometry) is { } axis
        ?
        [
            Toward("broadside", Broadside(axis)),
            Toward($"endfire {geometry.Channels[0].Label}", -1.0 * axis),
            Toward($"endfire {geometry.Channels[^1].Label}", axis),
        ]
        : [.. Enumerable.Range(0, 4).Select(static i => new LookDirection($"azimuth {90 * i}", 90 * i, 0))];

    /// <summary>Unit vector from the first channel to the last; null when the channels are not on a line.</summary>
    private static Position? Axis(ArrayGeometry geometry)
    {
        Position first = geometry[0], span = geometry[geometry.Count - 1] - first;
        if (span.Length < (1 - CollinearShare) * geometry.ApertureMetres) return null;
        Position axis = (1 / span.Length) * span;
        for (int i = 0; i < geometry.Count; i++)
        {
            Position off = geometry[i] - first;
            if ((off - (off.Dot(axis) * axis)).Length > CollinearShare * geometry.ApertureMetres) return null;
        }

        return axis;
    }

    /// <summary>Horizontal where the line allows it, to the left of its axis; the x-axis for a vertical line.</summary>
    private static Position Broadside(Position axis)
    {
        Position left = new(-axis.Y, axis.X, 0);
        return left.Length > 1e-6 ? (1 / left.Length) * left : new(1, 0, 0);
    }

    private static LookDirection Toward(string name, Position unit) => new(
        name, Round(Math.Atan2(unit.Y, unit.X)), Round(Math.Asin(Math.Clamp(unit.Z, -1, 1))));

    /// <summary>Degrees in (−180, 180], without a negative zero.</summary>
    private static double Round(double radians)
    {
        double degrees = Math.Round(radians * 180 / Math.PI, 6);
        return degrees <= -180 ? 180 : degrees + 0.0;
    }
}
