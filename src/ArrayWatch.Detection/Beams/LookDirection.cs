using ArrayWatch.Signals;

namespace ArrayWatch.Detection.Beams;

/// <summary>A direction in which the user forms beams.</summary>
/// <param name="Name">What people call it.</param>
/// <param name="AzimuthDegrees">From x toward y, degrees.</param>
/// <param name="ElevationDegrees">From the xy-plane toward z, degrees.</param>
public sealed record LookDirection(string Name, double AzimuthDegrees, double ElevationDegrees)
{
    /// <summary>Unit vector toward the source.</summary>
    public Position Unit => Position.Direction(AzimuthDegrees * Math.PI / 180, ElevationDegrees * Math.PI / 180);
}
