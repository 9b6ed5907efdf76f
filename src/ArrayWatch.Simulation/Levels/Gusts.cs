namespace ArrayWatch.Simulation.Levels;

/// <summary>
/// A level that wanders as gusty wind does: independent Gaussian levels at even knots, joined by
/// half-cosines, so that it is smooth and its deviation at the knots is the stated one.
/// </summary>
/// <param name="DeviationDecibels">Standard deviation at the knots, dB.</param>
/// <param name="KnotSeconds">Time between knots, positive.</param>
/// <param name="StartValue">Start value of the generator that draws the knots.</param>
public sealed record Gusts(double DeviationDecibels, double KnotSeconds, ulong StartValue) : ILevelCurve
{
    /// <inheritdoc/>
    public double DecibelsAt(double sceneSeconds)
    {
        double position = sceneSeconds / KnotSeconds;
        long knot = (long)Math.Floor(position);
        double blend = (1 - Math.Cos(Math.PI * (position - knot))) / 2;
        return DeviationDecibels * (((1 - blend) * Knot(knot)) + (blend * Knot(knot + 1)));
    }

    private double Knot(long index) => new RandomNumbers(StartValue).Fork(index).NextGaussian();
}
