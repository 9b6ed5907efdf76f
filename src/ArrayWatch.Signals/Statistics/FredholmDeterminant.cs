namespace ArrayWatch.Signals.Statistics;

/// <summary>ln det(1 − K) of a symmetric matrix with eigenvalues from 0 to below 1.</summary>
internal static class FredholmDeterminant
{
    /// <summary>The logarithm; relative accuracy also where K is tiny and the determinant rounds to 1.</summary>
    /// <param name="kernel">K, square and symmetric.</param>
    /// <returns>Not positive; −∞ where eigenvalues of K round to 1.</returns>
    public static double LogOneMinus(double[,] kernel)
    {
        double trace = 0;
        for (int i = 0; i < kernel.GetLength(0); i++) trace += kernel[i, i];
        return trace < 0.05 ? -Series(kernel) : Cholesky(kernel);
    }

    /// <summary>Σ tr Kᵐ/m = −ln det(1 − K): for a small trace it converges fast and subtracts nothing from 1.</summary>
    private static double Series(double[,] kernel)
    {
        int n = kernel.GetLength(0);
        double sum = 0;
        double[,] power = kernel;
        for (int m = 1; ; m++)
        {
            double trace = 0;
            for (int i = 0; i < n; i++) trace += power[i, i];
            sum += trace / m;
            // tr Kᵐ⁺¹ ≤ tr K · tr Kᵐ for eigenvalues that are not negative.
            if (trace * sum <= 1e-16 * sum || m > 40) return sum;
            power = Times(power, kernel);
        }
    }

    private static double[,] Times(double[,] a, double[,] b)
    {
        int n = a.GetLength(0);
        double[,] c = new double[n, n];
        for (int i = 0; i < n; i++)
        {
            for (int k = 0; k < n; k++)
            {
                double f = a[i, k];
                for (int j = 0; j < n; j++) c[i, j] += f * b[k, j];
            }
        }

        return c;
    }

    private static double Cholesky(double[,] kernel)
    {
        int n = kernel.GetLength(0);
        double log = 0;
        double[,] l = new double[n, n];
        for (int j = 0; j < n; j++)
        {
            double d = 1 - kernel[j, j];
            for (int k = 0; k < j; k++) d -= l[j, k] * l[j, k];
            if (!(d > 0)) return double.NegativeInfinity;
            log += Math.Log(d);
            l[j, j] = Math.Sqrt(d);
            for (int i = j + 1; i < n; i++)
            {
                double sum = -kernel[i, j];
                for (int k = 0; k < j; k++) sum -= l[i, k] * l[j, k];
                l[i, j] = sum / l[j, j];
            }
        }

        return Math.Min(0, log);
    }
}
