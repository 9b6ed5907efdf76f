using MathNet.Numerics;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// Average run length of a chart that adds up Gaussian evidence: L(u) = 1 + P(reset) L(0) + ∫ L(y) p(y | u) dy, solved by
/// collocation at Gauss–Legendre nodes.
/// </summary>
internal static class RunLength
{
    /// <summary>Φ(z).</summary>
    public static double Normal(double z) => 0.5 * SpecialFunctions.Erfc(-z / Constants.Sqrt2);

    /// <summary>φ(z).</summary>
    public static double Density(double z) => Math.Exp(-0.5 * z * z) / Math.Sqrt(2 * Math.PI);

    /// <summary>
    /// Solves for L at the point <paramref name="start"/>: on [low, high], density(y, u) goes from u to y, and the
    /// probability atom(u) of a jump to <paramref name="atomAt"/> is a point of its own (null for none).
    /// </summary>
    public static double Solve(
        double low, double high, int nodes, double start, Func<double, double, double> density, Func<double, double>? atom, double atomAt)
    {
        GaussLegendre rule = GaussLegendre.WithNodes(nodes);
        double width = high - low;
        int size = nodes + (atom is null ? 0 : 1);
        double Point(int i) => i < nodes ? low + (width * rule.Nodes[i]) : atomAt;
        Matrix<double> matrix = Matrix<double>.Build.Dense(size, size, (i, j) =>
        {
            double go = j < nodes ? width * rule.Weights[j] * density(Point(j), Point(i)) : atom!(Point(i));
            return (i == j ? 1 : 0) - go;
        });
        Vector<double> lengths = matrix.Solve(Vector<double>.Build.Dense(size, 1));
        double answer = 1 + (atom is null ? 0 : atom(start) * lengths[nodes]);
        for (int j = 0; j < nodes; j++) answer += width * rule.Weights[j] * density(Point(j), start) * lengths[j];
        return answer;
    }
}
