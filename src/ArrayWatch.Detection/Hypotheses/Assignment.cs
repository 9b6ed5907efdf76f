namespace ArrayWatch.Detection.Hypotheses;

/// <summary>
/// The assignment problem, by shortest augmenting paths with potentials (Kuhn 1955, Munkres 1957; the O(n³) form of
/// Jonker and Volgenant, Computing 38, 325–340, 1987).
/// </summary>
internal static class Assignment
{
    /// <summary>Finds the permutation of largest total score.</summary>
    /// <param name="score">n×n, finite: score of giving column j to row i.</param>
    /// <returns>The column of each row.</returns>
    public static int[] Maximise(double[,] score)
    {
        int n = score.GetLength(0);
        double[] u = new double[n + 1], v = new double[n + 1];
        int[] rowOf = new int[n + 1], way = new int[n + 1];
        for (int i = 1; i <= n; i++)
        {
            rowOf[0] = i;
            int j0 = 0;
            double[] least = new double[n + 1];
            Array.Fill(least, double.PositiveInfinity);
            bool[] used = new bool[n + 1];
            do
            {
                used[j0] = true;
                int i0 = rowOf[j0], j1 = 0;
                double delta = double.PositiveInfinity;
                for (int j = 1; j <= n; j++)
                {
                    if (used[j]) continue;
                    double reduced = -score[i0 - 1, j - 1] - u[i0] - v[j];
                    if (reduced < least[j]) (least[j], way[j]) = (reduced, j0);
                    if (least[j] < delta) (delta, j1) = (least[j], j);
                }

                for (int j = 0; j <= n; j++)
                {
                    if (used[j])
                    {
                        u[rowOf[j]] += delta;
                        v[j] -= delta;
                    }
                    else
                    {
                        least[j] -= delta;
                    }
                }

                j0 = j1;
            }
            while (rowOf[j0] != 0);
            for (; j0 != 0; j0 = way[j0]) rowOf[j0] = rowOf[way[j0]];
        }

        int[] columns = new int[n];
        for (int j = 1; j <= n; j++) columns[rowOf[j] - 1] = j - 1;
        return columns;
    }
}
