using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.Covariance;

/// <summary>Σ w_k x_k x_kᴴ / Σ w_k with explicit weights, in double precision: the second opinion.</summary>
internal static class WeightedSum
{
    public static float[] Noise(Random random, int values) => [.. Enumerable.Range(0, values).Select(_ => (float)Gaussian(random))];

    public static double Gaussian(Random random) => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());

    public static ComplexMatrix Estimate(float[] data, double[] weights, int bins, int channels, int bin)
    {
        var s = new ComplexMatrix(channels, channels);
        for (int l = 0; l < channels; l++)
        {
            for (int m = 0; m < channels; m++)
            {
                Complex sum = 0;
                for (int k = 0; k < weights.Length; k++) sum += weights[k] * At(data, k, bins, channels, bin, l) * Complex.Conjugate(At(data, k, bins, channels, bin, m));
                s[l, m] = sum / weights.Sum();
            }
        }

        return s;
    }

    /// <summary>Weights λ^(K−1−k).</summary>
    public static double[] Exponential(double lambda, int snapshots) => [.. Enumerable.Range(0, snapshots).Select(k => Math.Pow(lambda, snapshots - 1 - k))];

    /// <summary>Largest |a − b| relative to √(b_ll b_mm).</summary>
    public static double Difference(ComplexMatrix a, ComplexMatrix b)
    {
        double worst = 0;
        for (int l = 0; l < a.Rows; l++)
        {
            for (int m = 0; m < a.Rows; m++) worst = Math.Max(worst, Complex.Abs(a[l, m] - b[l, m]) / Math.Sqrt(b[l, l].Real * b[m, m].Real));
        }

        return worst;
    }

    private static Complex At(float[] data, int k, int bins, int channels, int bin, int n)
    {
        int at = 2 * ((((k * bins) + bin) * channels) + n);
        return new Complex(data[at], data[at + 1]);
    }
}
