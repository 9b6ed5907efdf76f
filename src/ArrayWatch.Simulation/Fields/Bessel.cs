namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Bessel functions of the first kind by Bessel's integral J_n(x) = (1/2π) ∫ cos(nθ − x sin θ) dθ over a full
/// turn. The trapezoidal rule on a periodic integrand converges faster than any power once its points
/// outnumber x. Written apart from the library's own on purpose: what judges must not share its formulas
/// with what is judged.
/// </summary>
internal static class Bessel
{
    public static double J0(double x) => Integral(0, x);

    public static double J1(double x) => Integral(1, x);

    private static double Integral(int order, double x)
    {
        int points = 32 + (2 * (int)Math.Ceiling(Math.Abs(x)));
        double sum = 0;
        for (int i = 0; i < points; i++)
        {
            double theta = 2 * Math.PI * i / points;
            sum += Math.Cos((order * theta) - (x * Math.Sin(theta)));
        }

        return sum / points;
    }
}
