namespace ArrayWatch.Signals.Statistics;

/// <summary>Roots of rising functions that cost much to evaluate.</summary>
internal static class Roots
{
    /// <summary>
    /// The root of a rising function between two limits: secants, each kept inside the bracket found so far, and a bisection whenever
    /// one would leave it. A nearly straight function takes four or five evaluations.
    /// </summary>
    /// <param name="rising">The function; may answer ±∞.</param>
    /// <param name="low">Lower limit; the root is at least this.</param>
    /// <param name="high">Upper limit; the root is at most this.</param>
    /// <param name="start">A guess between them.</param>
    /// <param name="step">About how far the guess may be off, positive.</param>
    /// <param name="tolerance">Absolute error asked for, positive.</param>
    public static double Rising(Func<double, double> rising, double low, double high, double start, double step, double tolerance)
    {
        double x = Math.Clamp(start, low, high), value = rising(x), previous = double.NaN, previousValue = double.NaN;
        for (int i = 0; i < 200; i++)
        {
            if (value == 0) return x;
            if (value > 0) high = x;
            else low = x;
            double next = double.IsNaN(previous)
                ? x + (value > 0 ? -step : step)
                : x - (value * (x - previous) / (value - previousValue));
            // A step this small is an answer even where rounding takes it just outside the bracket.
            if (Math.Abs(next - x) < tolerance || high - low < tolerance) return Math.Clamp(next, low, high);
            if (!(next > low && next < high)) next = (low + high) / 2;
            (previous, previousValue) = (x, value);
            x = next;
            value = rising(x);
        }

        return x;
    }
}
