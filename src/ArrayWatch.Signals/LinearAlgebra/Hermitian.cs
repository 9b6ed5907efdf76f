namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>Factorisation and products of Hermitian matrices, in place and without allocation.</summary>
public static class Hermitian
{
    /// <summary>
    /// Inverts the positive definite <paramref name="a"/> into <paramref name="inverse"/> by Cholesky
    /// factorisation (A = L Lᴴ, A⁻¹ = L⁻ᴴ L⁻¹).
    /// </summary>
    /// <param name="a">Hermitian, n×n; its lower triangle is read, and it is overwritten by L.</param>
    /// <param name="inverse">n×n; receives both triangles of A⁻¹.</param>
    /// <param name="logDeterminant">ln det A, nepers; NaN when the method answers false.</param>
    /// <returns>False when A is not positive definite.</returns>
    /// <exception cref="ArgumentException">The shapes do not agree.</exception>
    public static bool TryInvert(ComplexMatrix a, ComplexMatrix inverse, out double logDeterminant)
    {
        ArgumentNullException.ThrowIfNull(a);
        ArgumentNullException.ThrowIfNull(inverse);
        int n = a.Rows;
        if (a.Columns != n || inverse.Rows != n || inverse.Columns != n)
            throw new ArgumentException("square matrices of one size are needed", nameof(inverse));
        double[] re = a.Re, im = a.Im;
        logDeterminant = double.NaN;
        double log = 0;
        for (int j = 0; j < n; j++)
        {
            int rj = j * n;
            double d = re[rj + j];
            for (int k = 0; k < j; k++) d -= (re[rj + k] * re[rj + k]) + (im[rj + k] * im[rj + k]);
            if (!(d > 0) || !double.IsFinite(d)) return false;
            d = Math.Sqrt(d);
            log += Math.Log(d);
            re[rj + j] = d;
            im[rj + j] = 0;
            for (int i = j + 1; i < n; i++)
            {
                int ri = i * n;
                double sr = re[ri + j], si = im[ri + j];
                for (int k = 0; k < j; k++)
                {
                    sr -= (re[ri + k] * re[rj + k]) + (im[ri + k] * im[rj + k]);
                    si -= (im[ri + k] * re[rj + k]) - (re[ri + k] * im[rj + k]);
                }

                re[ri + j] = sr / d;
                im[ri + j] = si / d;
            }
        }

        InvertLowerTriangle(re, im, n);
        double[] or = inverse.Re, oi = inverse.Im;
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                double sr = 0, si = 0;
                for (int k = i; k < n; k++)
                {
                    double ar = re[(k * n) + i], ai = -im[(k * n) + i], br = re[(k * n) + j], bi = im[(k * n) + j];
                    sr += (ar * br) - (ai * bi);
                    si += (ar * bi) + (ai * br);
                }

                or[(i * n) + j] = sr;
                oi[(i * n) + j] = si;
                or[(j * n) + i] = sr;
                oi[(j * n) + i] = -si;
            }
        }

        logDeterminant = 2 * log;
        return true;
    }

    private static void InvertLowerTriangle(double[] re, double[] im, int n)
    {
        for (int j = 0; j < n; j++)
        {
            re[(j * n) + j] = 1 / re[(j * n) + j];
            for (int i = j + 1; i < n; i++)
            {
                double sr = 0, si = 0;
                for (int k = j; k < i; k++)
                {
                    double ar = re[(i * n) + k], ai = im[(i * n) + k], br = re[(k * n) + j], bi = im[(k * n) + j];
                    sr += (ar * br) - (ai * bi);
                    si += (ar * bi) + (ai * br);
                }

                double d = -1 / re[(i * n) + i];
                re[(i * n) + j] = sr * d;
                im[(i * n) + j] = si * d;
            }
        }
    }
}
