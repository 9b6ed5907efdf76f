using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Shapes;

/// <summary>A line bent to a parabola between its ends, slowly to one side and the other.</summary>
/// <param name="SagittaMetres">Largest displacement of the middle, metres.</param>
/// <param name="Toward">Unit vector of the bow.</param>
/// <param name="PeriodSeconds">Time for a full swing; infinite for a steady bow.</param>
public sealed record LineBow(double SagittaMetres, Position Toward, double PeriodSeconds = double.PositiveInfinity) : IArrayShape
{
    /// <inheritdoc/>
    public Position DisplacementAt(ArrayGeometry geometry, int channel, double sceneSeconds)
    {
        double s = (2 * LinePlace.Fraction(geometry, channel)) - 1;
        double swing = double.IsInfinity(PeriodSeconds) ? 1 : Math.Cos(2 * Math.PI * sceneSeconds / PeriodSeconds);
        return (SagittaMetres * swing * (1 - (s * s))) * Toward;
    }
}
