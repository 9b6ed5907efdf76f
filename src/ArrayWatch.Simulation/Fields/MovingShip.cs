using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// A ship that passes on a straight course, heard as a plane wave whose bearing and level follow:
/// spherical spreading re its closest point.
/// </summary>
public sealed record MovingShip : WaveSource
{
    /// <summary>Scene time of the closest point of approach.</summary>
    public required double ClosestSeconds { get; init; }

    /// <summary>Distance at the closest point, metres, positive.</summary>
    public required double ClosestRangeMetres { get; init; }

    /// <summary>Bearing at the closest point, radians from x toward y.</summary>
    public required double ClosestBearingRadians { get; init; }

    /// <summary>Speed, m/s; positive lets the bearing grow.</summary>
    public required double SpeedMetresPerSecond { get; init; }

    /// <summary>Bearing at a time, radians.</summary>
    public double BearingAt(double sceneSeconds) =>
        ClosestBearingRadians + Math.Atan2(SpeedMetresPerSecond * (sceneSeconds - ClosestSeconds), ClosestRangeMetres);

    /// <inheritdoc/>
    public override void AddWave(SoundMoment moment, (double Re, double Im) amplitude, Span<double> re, Span<double> im)
    {
        double along = SpeedMetresPerSecond * (moment.SceneSeconds - ClosestSeconds) / ClosestRangeMetres;
        double a = Math.Sqrt(Spectrum.PowerAt(moment.FrequencyHertz) / (1 + (along * along))) * AmplitudeAt(moment.SceneSeconds);
        AddPlane(moment, Position.Direction(BearingAt(moment.SceneSeconds), 0), a * amplitude.Re, a * amplitude.Im, re, im);
    }
}
