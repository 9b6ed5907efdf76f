using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Shapes;

/// <summary>A sine that travels slowly along a line.</summary>
/// <param name="AmplitudeMetres">Largest displacement, metres.</param>
/// <param name="Toward">Unit vector of the displacement.</param>
/// <param name="Waves">Waves along the whole line.</param>
/// <param name="PeriodSeconds">Time for the sine to travel by one wave; infinite for a steady shape.</param>
public sealed record LineSnake(double AmplitudeMetres, Position Toward, double Waves, double PeriodSeconds = double.PositiveInfinity) : IArrayShape
{
    /// <inheritdoc/>
    public Position DisplacementAt(ArrayGeometry geometry, int channel, double sceneSeconds)
    {
        double turns = (Waves * LinePlace.Fraction(geometry, channel)) - (double.IsInfinity(PeriodSeconds) ? 0 : sceneSeconds / PeriodSeconds);
        return (AmplitudeMetres * Math.Sin(2 * Math.PI * turns)) * Toward;
    }
}
