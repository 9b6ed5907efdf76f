using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>A channel × time picture small enough to send; of several channels in one row the largest deviation is kept.</summary>
/// <param name="Times">Column times.</param>
/// <param name="Labels">Row labels.</param>
/// <param name="Rows">Values; NaN where there is nothing.</param>
/// <param name="Limit">Colour range: from −Limit to +Limit for deviations; 0 when the range follows the data.</param>
internal sealed record TrendGridView(IReadOnlyList<DateTimeOffset> Times, IReadOnlyList<string> Labels, double[][] Rows, double Limit)
{
    /// <summary>Makes the picture; null when there is no value at all.</summary>
    public static TrendGridView? Of(TrendGrid grid, IReadOnlyList<string> labels, bool isDeviation)
    {
        ArgumentNullException.ThrowIfNull(grid);
        int channels = Math.Min(grid.Values.Length, labels.Count);
        if (channels == 0 || !grid.Values.Any(static row => row.Any(double.IsFinite))) return null;
        int block = (channels + MatrixPicture.Largest - 1) / MatrixPicture.Largest;
        int size = (channels + block - 1) / block;
        double[][] rows = new double[size][];
        for (int r = 0; r < size; r++)
        {
            rows[r] = new double[grid.Times.Length];
            for (int t = 0; t < rows[r].Length; t++)
            {
                double kept = double.NaN;
                for (int c = r * block; c < Math.Min(channels, (r + 1) * block); c++)
                {
                    double v = grid.Values[c][t];
                    if (double.IsFinite(v) && !(Math.Abs(v) <= Math.Abs(kept))) kept = v;
                }
                rows[r][t] = kept;
            }
        }
        return new(grid.Times, [.. Enumerable.Range(0, size).Select(i => labels[i * block])], rows, isDeviation ? SensibleLimit(rows) : 0);
    }

    /// <summary>A range in which the usual scatter stays pale and a fault is deep: ten times the median deviation, at least 1, at most the largest.</summary>
    private static double SensibleLimit(double[][] rows)
    {
        double[] sizes = [.. rows.SelectMany(static row => row).Where(double.IsFinite).Select(Math.Abs).Order()];
        return Math.Max(1, Math.Min(sizes[^1], 10 * sizes[sizes.Length / 2]));
    }
}
