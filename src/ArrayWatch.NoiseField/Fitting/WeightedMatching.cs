using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>
/// Fits the powers of a field to a covariance by weighted covariance matching (Ottersten, Stoica and Roy,
/// "Covariance matching estimation techniques for array signal processing applications", Digital Signal
/// Process. 8, 185–210, 1998), iterated so that the weight follows the fit: the fixed point solves the
/// Wishart likelihood equations.
/// </summary>
/// <remarks>
/// <para>With W = R⁻¹ from the last powers and P = W S′ W, one step solves, over powers ≥ 0, the normal equations</para>
/// <list type="table">
/// <item><term>wave p, wave q</term><description>|v_pᴴ W v_q|²; right side v_qᴴ P v_q</description></item>
/// <item><term>wave p, noise i</term><description>|(W v_p)_i|²; right side P_ii</description></item>
/// <item><term>noise i, noise j</term><description>|W_ij|²</description></item>
/// <item><term>dense d, wave q</term><description>v_qᴴ W C_d W v_q; right side tr(C_d P)</description></item>
/// <item><term>dense d, noise i</term><description>(W C_d W)_ii</description></item>
/// <item><term>dense d, dense e</term><description>tr(W C_d W C_e)</description></item>
/// </list>
/// <para>Only waves that hold power, or whose likelihood gradient v_qᴴ (P − W) v_q is positive, enter.</para>
/// </remarks>
public sealed class WeightedMatching
{
    // Thirty decibels below the level: no model of a field is right beyond that.
    private const double LeastNoise = 1e-3;

    // A channel is not much quieter than its fellows: noise that collapses at a few channels gives them all the weight,
    // and the fit settles where their sampling errors are explained.
    private const double LeastOfUsual = 0.2;

    // Waves that may join at one step: the steepest; others join at the next.
    private const int NewWaves = 16;

    private readonly FitWorkspace _work;

    /// <summary>Works in the given matrices.</summary>
    public WeightedMatching(FitWorkspace work)
    {
        ArgumentNullException.ThrowIfNull(work);
        _work = work;
    }

    /// <summary>Improves <paramref name="powers"/>, and leaves the workspace with the field, W and its products at the result.</summary>
    /// <param name="powers">The start; receives the fit. All zero is a fair start.</param>
    /// <param name="trusted">Which channels count; the others' own noise is left alone.</param>
    /// <param name="iterations">Steps, at least 1.</param>
    /// <returns>False when the data do not allow a fit (no power).</returns>
    public bool TryFit(FieldPowers powers, ReadOnlySpan<bool> trusted, int iterations)
    {
        ArgumentNullException.ThrowIfNull(powers);
        if (!Start(powers, trusted)) return false;
        for (int it = 0; it < iterations; it++)
        {
            powers.WriteField(_work.Field);
            if (!TrustedInverse.TryUpdate(_work, powers.ChannelNoise, trusted)) return false;
            Step(powers, trusted);
        }

        powers.WriteField(_work.Field);
        return TrustedInverse.TryUpdate(_work, powers.ChannelNoise, trusted);
    }

    private bool Start(FieldPowers powers, ReadOnlySpan<bool> trusted)
    {
        int n = _work.Channels, count = 0;
        double sum = 0;
        for (int i = 0; i < n; i++)
        {
            if (!trusted[i]) continue;
            sum += _work.Data.Re[(i * n) + i];
            count++;
        }

        if (count < 2 || !(sum > 0)) return false;
        double mean = sum / count;
        bool cold = powers.FieldPower <= 0;
        for (int i = 0; i < n; i++)
        {
            if (!trusted[i]) continue;
            double own = _work.Data.Re[(i * n) + i];
            if (cold) powers.ChannelNoise[i] = Math.Max(own, LeastNoise * mean);
            else powers.ChannelNoise[i] = Math.Max(powers.ChannelNoise[i], LeastNoise * mean);
        }

        return true;
    }

    private void Step(FieldPowers powers, ReadOnlySpan<bool> trusted)
    {
        FieldBasis basis = powers.Basis;
        int n = basis.Channels;
        int[] waves = Candidates(powers);
        int[] noises = [.. Indices(trusted)];
        int w = waves.Length, d = basis.Dense.Length, size = w + d + noises.Length;
        double[] gram = new double[size * size], right = new double[size], x = new double[size];
        double power = 0;
        foreach (int i in noises) power += _work.Data.Re[(i * n) + i] / noises.Length;
        if (w > 0) WaveBlock(powers, waves, noises, gram, right, x, size);
        for (int e = 0; e < d; e++) DenseBlock(powers, e, waves, noises, gram, right, x, size);
        for (int a = 0; a < noises.Length; a++)
        {
            int i = noises[a], row = w + d + a;
            for (int b = 0; b < noises.Length; b++)
            {
                double re = _work.Weight.Re[(i * n) + noises[b]], im = _work.Weight.Im[(i * n) + noises[b]];
                gram[(row * size) + w + d + b] = (re * re) + (im * im);
            }

            right[row] = _work.WeightDataWeight.Re[(i * n) + i];
            x[row] = powers.ChannelNoise[i];
        }

        NonNegativeLeastSquares.Solve(gram, right, x);
        Array.Clear(powers.Waves);
        for (int a = 0; a < w; a++) powers.Waves[waves[a]] = x[a];
        for (int e = 0; e < d; e++) powers.Dense[e] = x[w + e];
        double[] own = x[(w + d)..];
        Array.Sort(own);
        double floor = Math.Max(LeastNoise * power, LeastOfUsual * own[own.Length / 2]);
        for (int a = 0; a < noises.Length; a++) powers.ChannelNoise[noises[a]] = Math.Max(x[w + d + a], floor);
    }

    private static List<int> Indices(ReadOnlySpan<bool> trusted)
    {
        List<int> list = [];
        for (int i = 0; i < trusted.Length; i++)
        {
            if (trusted[i]) list.Add(i);
        }

        return list;
    }

    private int[] Candidates(FieldPowers powers)
    {
        int q = powers.Waves.Length;
        if (q == 0) return [];
        double[] gain = new double[q], cost = new double[q];
        Products.QuadraticForms(powers.Basis.Waves, _work.WeightDataWeight, gain);
        Products.QuadraticForms(powers.Basis.Waves, _work.Weight, cost);
        double least = 1e-6 * powers.FieldPower;
        HashSet<int> chosen = [.. Enumerable.Range(0, q).Where(i => powers.Waves[i] > least)];
        foreach (int i in Enumerable.Range(0, q).Where(i => gain[i] > cost[i] && !chosen.Contains(i)).OrderByDescending(i => gain[i] / cost[i]).Take(NewWaves))
            chosen.Add(i);

        return [.. chosen.Order()];
    }

    private void WaveBlock(FieldPowers powers, int[] waves, int[] noises, double[] gram, double[] right, double[] x, int size)
    {
        int n = powers.Basis.Channels, w = waves.Length, d = powers.Basis.Dense.Length;
        ComplexMatrix rows = new(w, n), conjugate = _work.Scratch, weighted = new(w, n);
        for (int a = 0; a < w; a++)
        {
            powers.Basis.Waves.Re.AsSpan(waves[a] * n, n).CopyTo(rows.Re.AsSpan(a * n));
            powers.Basis.Waves.Im.AsSpan(waves[a] * n, n).CopyTo(rows.Im.AsSpan(a * n));
            x[a] = powers.Waves[waves[a]];
        }

        double[] block = new double[w * w];
        Products.GramMagnitudes(rows, _work.Weight, block);
        for (int a = 0; a < w; a++) block.AsSpan(a * w, w).CopyTo(gram.AsSpan(a * size));
        Products.QuadraticForms(rows, _work.WeightDataWeight, right.AsSpan(0, w));

        // Row a of V W* is (W v_a)ᵀ, W being Hermitian.
        conjugate.CopyFrom(_work.Weight);
        for (int i = 0; i < conjugate.Im.Length; i++) conjugate.Im[i] = -conjugate.Im[i];
        Products.Multiply(rows, conjugate, weighted);
        for (int a = 0; a < w; a++)
        {
            for (int b = 0; b < noises.Length; b++)
            {
                double re = weighted.Re[(a * n) + noises[b]], im = weighted.Im[(a * n) + noises[b]], g = (re * re) + (im * im);
                gram[(a * size) + w + d + b] = g;
                gram[((w + d + b) * size) + a] = g;
            }
        }
    }

    private void DenseBlock(FieldPowers powers, int e, int[] waves, int[] noises, double[] gram, double[] right, double[] x, int size)
    {
        int n = powers.Basis.Channels, w = waves.Length, d = powers.Basis.Dense.Length, row = w + e;
        ComplexMatrix coherence = powers.Basis.Dense[e].Coherence, half = _work.Scratch, whole = _work.ScratchToo;
        Products.Multiply(_work.Weight, coherence, half);
        Products.Multiply(half, _work.Weight, whole);
        if (w > 0)
        {
            ComplexMatrix rows = new(w, n);
            for (int a = 0; a < w; a++)
            {
                powers.Basis.Waves.Re.AsSpan(waves[a] * n, n).CopyTo(rows.Re.AsSpan(a * n));
                powers.Basis.Waves.Im.AsSpan(waves[a] * n, n).CopyTo(rows.Im.AsSpan(a * n));
            }

            double[] forms = new double[w];
            Products.QuadraticForms(rows, whole, forms);
            for (int a = 0; a < w; a++)
            {
                gram[(row * size) + a] = forms[a];
                gram[(a * size) + row] = forms[a];
            }
        }

        for (int b = 0; b < noises.Length; b++)
        {
            double g = whole.Re[(noises[b] * n) + noises[b]];
            gram[(row * size) + w + d + b] = g;
            gram[((w + d + b) * size) + row] = g;
        }

        for (int other = e; other < d; other++)
        {
            double g = TraceOfProduct(whole, powers.Basis.Dense[other].Coherence);
            gram[(row * size) + w + other] = g;
            gram[((w + other) * size) + row] = g;
        }

        right[row] = TraceOfProduct(_work.WeightDataWeight, coherence);
        x[row] = powers.Dense[e];
    }

    // tr(A B) of Hermitian matrices is Σ A_ij B_ij*, which is real.
    private static double TraceOfProduct(ComplexMatrix a, ComplexMatrix b)
    {
        double sum = 0;
        for (int i = 0; i < a.Re.Length; i++) sum += (a.Re[i] * b.Re[i]) + (a.Im[i] * b.Im[i]);
        return sum;
    }
}
