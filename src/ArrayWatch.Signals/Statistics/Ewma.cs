namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// Average run lengths of the exponentially weighted chart z ← λx + (1−λ)z from z = 0, alarm when
/// |z| &gt; L√[λ/(2−λ)], for independent x of unit variance (Lucas and Saccucci, Technometrics 32, 1–12, 1990).
/// </summary>
public static class Ewma
{
    /// <summary>Average run length of the two-sided chart with fixed limits.</summary>
    /// <param name="mean">μ of x, −10 to 10.</param>
    /// <param name="weight">λ, 0.001 to 1.</param>
    /// <param name="limit">L, in standard deviations of the settled z, 0.1 to 6.</param>
    /// <returns>Decisions; relative error near 1e-8 up to 10⁶, growing with the length.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    /// <remarks>Crowder's integral equation, Technometrics 29, 401–407, 1987.</remarks>
    public static double AverageRunLength(double mean, double weight, double limit)
    {
        Check.InRange(mean, -10, 10, "the mean");
        Check.InRange(weight, 0.001, 1, "the weight");
        Check.InRange(limit, 0.1, 6, "the control limit");
        double edge = limit * Math.Sqrt(weight / (2 - weight));
        // The kernel is a bell of width λ, at least ten nodes of which must lie on it.
        int nodes = Math.Min(400, 48 + (int)Math.Ceiling(16 * edge / weight));
        return RunLength.Solve(
            -edge,
            edge,
            nodes,
            0,
            (y, u) => RunLength.Density(((y - ((1 - weight) * u)) / weight) - mean) / weight,
            atom: null,
            atomAt: 0);
    }

    /// <summary>The limit L whose run length without a shift is <paramref name="runLength"/>.</summary>
    /// <param name="weight">λ, 0.001 to 1.</param>
    /// <param name="runLength">Decisions between false alarms, 5 to 10⁷.</param>
    /// <returns>L.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LimitFor(double weight, double runLength)
    {
        Check.InRange(runLength, 5, 1e7, "the run length");
        // Independent decisions would need this limit; those of a slow chart hang together and need less.
        double start = NormalTail.QuantileOfLogUpper(-Math.Log(2 * runLength));
        return Roots.Rising(limit => Math.Log(AverageRunLength(0, weight, limit) / runLength), 0.1, 6, start, 0.1, 1e-9);
    }
}
