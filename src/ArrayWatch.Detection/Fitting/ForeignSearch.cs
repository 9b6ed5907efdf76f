using System.Numerics;
using System.Runtime.InteropServices;
using ArrayWatch.NoiseField.Fitting;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// Looks for a coherent component that the fitted field does not hold: the largest eigenvalue of R⁻¹S. With
/// S = R + a aᴴ its eigenvector z gives the pattern a = √((λ−1)/zᴴRz) R z. A pattern that one or two plane waves
/// explain is an arrival that the field missed; another is foreign.
/// </summary>
internal sealed class ForeignSearch
{
    private const int PowerSteps = 40;

    // Of a dozen channels any pattern is two waves or so: only larger arrays can tell two correlated paths from a foreign pattern.
    private const int ChannelsForTwoWaves = 16;

    private readonly FitWorkspace _work;
    private readonly int _n;

    public ForeignSearch(FitWorkspace work)
    {
        _work = work;
        _n = work.Channels;
    }

    /// <summary>Pattern of the last search at every channel, in the units of the data with gains taken out.</summary>
    public Complex[] Pattern { get; private set; } = [];


    /// <summary>Finds the largest eigenvalue, and its pattern.</summary>
    public double Search(FieldPowers powers, bool[] trusted)
    {
        Complex[] z = new Complex[_n];
        uint state = 0x9E3779B9;
        for (int i = 0; i < _n; i++)
        {
            if (!trusted[i]) continue;
            state = (state * 1664525) + 1013904223;
            z[i] = Complex.FromPolarCoordinates(1, state * (2 * Math.PI / uint.MaxValue));
        }

        Complex[] modelled = new Complex[_n];
        double eigenvalue = 0;
        for (int step = 0; step < PowerSteps; step++)
        {
            Complex[] next = Times(_work.WeightData, z);
            Model(powers, trusted, next, modelled);
            double norm = Form(next, modelled);
            if (!(norm > 0)) return 0;
            double scale = 1 / Math.Sqrt(norm);
            for (int i = 0; i < _n; i++) next[i] *= scale;
            z = next;
            Model(powers, trusted, z, modelled);
            double before = eigenvalue;
            eigenvalue = Form(z, Times(_work.Data, z, trusted)) / Form(z, modelled);
            if (step > 4 && Math.Abs(eigenvalue - before) < 1e-4 * eigenvalue) break;
        }

        double root = Math.Sqrt(Math.Max(0, eigenvalue - 1) / Form(z, modelled));
        Complex[] seen = Times(_work.Data, z), field = Times(_work.Field, z);
        Complex[] pattern = new Complex[_n];
        for (int i = 0; i < _n; i++)
        {
            Complex expected = field[i] + (powers.ChannelNoise[i] * z[i]);
            pattern[i] = trusted[i] ? root * expected : root * (seen[i] - field[i]) / Math.Max(eigenvalue - 1, 1e-9);
        }

        Pattern = pattern;
        return eigenvalue;
    }

    /// <summary>Share of the last pattern that the best waves explain, 0 to 1, in the whitened metric.</summary>
    public double ShareOfWaves(FieldBasis basis, bool[] trusted)
    {
        Complex[] pattern = Pattern;
        Complex[] a = [.. pattern.Select((p, i) => trusted[i] ? p : Complex.Zero)];
        double total = Form(a, Times(_work.Weight, a));
        if (!(total > 0) || basis.Directions.Length == 0) return 0;
        int n = _n, q = basis.Directions.Length;
        List<Complex[]> chosen = [];
        Complex[] residual = a;
        double explained = 0;
        double[] cost = new double[q];
        Products.QuadraticForms(basis.Waves, _work.Weight, cost);
        int waves = trusted.Count(t => t) >= ChannelsForTwoWaves ? 2 : 1;
        for (int k = 0; k < waves; k++)
        {
            Complex[] weighted = Times(_work.Weight, residual);
            int best = 0;
            double most = -1;
            for (int w = 0; w < q; w++)
            {
                Complex inner = 0;
                for (int i = 0; i < n; i++) inner += new Complex(basis.Waves.Re[(w * n) + i], -basis.Waves.Im[(w * n) + i]) * weighted[i];
                double share = ((inner.Real * inner.Real) + (inner.Imaginary * inner.Imaginary)) / Math.Max(cost[w], 1e-300);
                if (share > most) (most, best) = (share, w);
            }

            Complex[] v = new Complex[n];
            for (int i = 0; i < n; i++) v[i] = trusted[i] ? new Complex(basis.Waves.Re[(best * n) + i], basis.Waves.Im[(best * n) + i]) : Complex.Zero;
            foreach (Complex[] u in chosen)
            {
                Complex c = Inner(u, Times(_work.Weight, v)) / Form(u, Times(_work.Weight, u));
                for (int i = 0; i < n; i++) v[i] -= c * u[i];
            }

            double norm = Form(v, Times(_work.Weight, v));
            if (!(norm > 1e-9 * cost[best])) break;
            Complex along = Inner(v, Times(_work.Weight, residual)) / norm;
            residual = [.. residual.Select((r, i) => r - (along * v[i]))];
            chosen.Add(v);
            explained = 1 - (Form(residual, Times(_work.Weight, residual)) / total);
        }

        return explained;
    }

    private void Model(FieldPowers powers, bool[] trusted, Complex[] z, Complex[] result)
    {
        Complex[] field = Times(_work.Field, z, trusted);
        for (int i = 0; i < _n; i++) result[i] = trusted[i] ? field[i] + (powers.ChannelNoise[i] * z[i]) : Complex.Zero;
    }

    private Complex[] Times(ComplexMatrix m, Complex[] z, bool[]? rows = null)
    {
        double[] zr = new double[_n], zi = new double[_n];
        for (int j = 0; j < _n; j++) (zr[j], zi[j]) = (z[j].Real, z[j].Imaginary);
        Complex[] result = new Complex[_n];
        for (int i = 0; i < _n; i++)
        {
            if (rows is not null && !rows[i]) continue;
            ReadOnlySpan<double> mr = m.Re.AsSpan(i * _n, _n), mi = m.Im.AsSpan(i * _n, _n);
            result[i] = new Complex(Dot(mr, zr) - Dot(mi, zi), Dot(mr, zi) + Dot(mi, zr));
        }

        return result;
    }

    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        ReadOnlySpan<Vector<double>> va = MemoryMarshal.Cast<double, Vector<double>>(a), vb = MemoryMarshal.Cast<double, Vector<double>>(b);
        Vector<double> sum = default;
        for (int i = 0; i < va.Length; i++) sum += va[i] * vb[i];
        double total = Vector.Sum(sum);
        for (int i = va.Length * Vector<double>.Count; i < a.Length; i++) total += a[i] * b[i];
        return total;
    }

    private static double Form(Complex[] a, Complex[] b) => Inner(a, b).Real;

    private static Complex Inner(Complex[] a, Complex[] b)
    {
        Complex sum = 0;
        for (int i = 0; i < a.Length; i++) sum += Complex.Conjugate(a[i]) * b[i];
        return sum;
    }
}
