namespace ArrayWatch.Web.ViewModels;

/// <summary>
/// An N×N picture made small enough to send to a page. Magnitudes keep the largest value of each block, so that a single
/// wrong pair still shows; phases keep that of the block's centre, because angles of different pairs have no mean.
/// </summary>
/// <param name="Labels">Label of each row and column: the first channel of the block.</param>
/// <param name="Rows">Values, row by row.</param>
/// <param name="Block">Channels to a block; 1 when nothing was left out.</param>
internal sealed record MatrixPicture(IReadOnlyList<string> Labels, double[][] Rows, int Block)
{
    /// <summary>Most rows and columns that are sent.</summary>
    public const int Largest = 128;

    /// <summary>Makes the picture.</summary>
    /// <param name="values">N² values, row-major.</param>
    /// <param name="labels">N labels.</param>
    /// <param name="isPhase">True for angles.</param>
    /// <returns>Null when there are no values.</returns>
    public static MatrixPicture? Of(float[] values, IReadOnlyList<string> labels, bool isPhase)
    {
        int n = labels.Count;
        if (values.Length == 0 || values.Length != n * n) return null;
        int block = (n + Largest - 1) / Largest;
        int size = (n + block - 1) / block;
        double[][] rows = new double[size][];
        for (int r = 0; r < size; r++)
        {
            rows[r] = new double[size];
            for (int c = 0; c < size; c++) rows[r][c] = isPhase ? Centre(r, c) : BlockMaximum(r, c);
        }
        return new([.. Enumerable.Range(0, size).Select(i => labels[i * block])], rows, block);

        double Centre(int r, int c) => values[(Math.Min(n - 1, (r * block) + (block / 2)) * n) + Math.Min(n - 1, (c * block) + (block / 2))];

        double BlockMaximum(int r, int c)
        {
            double largest = double.NaN;
            for (int i = r * block; i < Math.Min(n, (r + 1) * block); i++)
            {
                for (int j = c * block; j < Math.Min(n, (c + 1) * block); j++)
                {
                    // A channel's coherence with itself is 1 and would hide its block's other pairs.
                    if (block > 1 && i == j) continue;
                    double v = values[(i * n) + j];
                    if (!(v <= largest)) largest = double.IsNaN(v) ? largest : v;
                }
            }
            return largest;
        }
    }
}
