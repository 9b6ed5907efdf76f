using ArrayWatch.Signals.Covariance;
using ArrayWatch.Signals.Kernels;
using ArrayWatch.Signals.LinearAlgebra;
using BenchmarkDotNet.Attributes;
using MathNet.Numerics;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Benchmarks;

/// <summary>
/// One block of K snapshots into the covariances of 64 bins: S ← λᴷ S + Σ (1−λ) λ^(K−1−k) x xᴴ, weighting and packing
/// included, every candidate from the same data to the same result.
/// </summary>
public unsafe class RankUpdateBenchmarks
{
    private const int Bins = 64;
    private const double Lambda = 0.98;
    private float[] _data = [];
    private float[] _amplitudes = [];
    private float[] _weighted = [];
    private float[][] _native = [];
    private Matrix<Complex32>[] _managed = [];
    private Matrix<Complex32> _rows = Matrix<Complex32>.Build.Dense(1, 1);
    private CovarianceStore _store = new(KernelTier.Scalar, 1, 1);
    private ExponentialCovariance _covariance = new(1, 1, TimeSpan.FromSeconds(1));

    [ParamsSource(nameof(AllChannels))]
    public int Channels { get; set; }

    [ParamsSource(nameof(AllSnapshots))]
    public int Snapshots { get; set; }

    public static IEnumerable<int> AllChannels => Sizes.Channels;

    public static IEnumerable<int> AllSnapshots => Sizes.Snapshots;

    private static double IntervalSeconds => -Math.Log(Lambda);

    private float Keep => (float)Math.Pow(Lambda, Snapshots);

    [GlobalSetup]
    public void Setup()
    {
        OpenBlas.Require();
        var random = new Random(20270201);
        _data = [.. Enumerable.Range(0, 2 * Snapshots * Bins * Channels).Select(_ => random.NextSingle() - 0.5f)];
        _amplitudes = [.. Enumerable.Range(0, Snapshots).Select(k => (float)Math.Sqrt((1 - Lambda) * Math.Pow(Lambda, Snapshots - 1 - k)))];
        _weighted = new float[2 * Channels * Snapshots];
        _native = [.. Enumerable.Range(0, Bins).Select(_ => new float[2 * Channels * Channels])];
        _managed = [.. Enumerable.Range(0, Bins).Select(_ => Matrix<Complex32>.Build.Dense(Channels, Channels))];
        _rows = Matrix<Complex32>.Build.Dense(Snapshots, Channels);
        _store = new CovarianceStore(KernelTiers.Best, Channels, Bins);
        _covariance = new ExponentialCovariance(Channels, Bins, TimeSpan.FromSeconds(1));
        CheckSameResult();
    }

    [Benchmark(Baseline = true)]
    public void Cherk()
    {
        fixed (float* x = _weighted)
        {
            for (int f = 0; f < Bins; f++)
            {
                Weight(f);
                fixed (float* s = _native[f]) OpenBlas.Cherk(OpenBlas.ColumnMajor, OpenBlas.Lower, OpenBlas.NoTranspose, Channels, Snapshots, 1, x, Channels, Keep, s, Channels);
            }
        }
    }

    [Benchmark]
    public void MathNet()
    {
        for (int f = 0; f < Bins; f++)
        {
            Weight(f);
            for (int k = 0; k < Snapshots; k++)
            {
                for (int n = 0; n < Channels; n++) _rows[k, n] = new Complex32(_weighted[2 * ((k * Channels) + n)], -_weighted[(2 * ((k * Channels) + n)) + 1]);
            }

            _managed[f].Multiply(Keep, _managed[f]);
            _managed[f].Add(_rows.ConjugateTransposeThisAndMultiply(_rows), _managed[f]);
        }
    }

    /// <summary>Packing and tiles, each block at once.</summary>
    [Benchmark]
    public void Tiles()
    {
        for (int f = 0; f < Bins; f++)
        {
            for (int k = 0; k < Snapshots; k++) _store.Pack(f, 0, k, _data.AsSpan(2 * k * Bins * Channels, 2 * Bins * Channels), _amplitudes[k], false);
            _store.Update(f, 0, Snapshots, Keep, 1);
        }
    }

    /// <summary>The public door: the check for non-finite values, scale, weights and effective snapshots as well; small blocks wait for others.</summary>
    [Benchmark]
    public int Fold() => _covariance.Fold(_data, Snapshots, IntervalSeconds, 0);

    private void Weight(int bin)
    {
        for (int k = 0; k < Snapshots; k++)
        {
            ReadOnlySpan<float> from = _data.AsSpan(2 * ((k * Bins) + bin) * Channels, 2 * Channels);
            VectorScale.Multiply(from, _amplitudes[k], _weighted.AsSpan(2 * k * Channels, 2 * Channels));
        }
    }

    /// <summary>After two blocks from zero, every candidate holds the same sums.</summary>
    private void CheckSameResult()
    {
        for (int block = 0; block < 2; block++)
        {
            Cherk();
            MathNet();
            Tiles();
            Fold();
        }

        double weight = 1 - Math.Pow(Lambda, 2 * Snapshots);
        foreach (int f in (int[])[0, Bins - 1])
        {
            ComplexMatrix tiles = new(Channels, Channels), folded = new(Channels, Channels);
            _store.Copy(f, 1, tiles);
            _covariance.CopyBin(f, folded);
            for (int l = 0; l < Channels; l++)
            {
                for (int m = 0; m <= l; m++)
                {
                    int at = 2 * ((m * Channels) + l);
                    Expect(tiles.Re[(l * Channels) + m], _native[f][at]);
                    Expect(tiles.Im[(l * Channels) + m], _native[f][at + 1]);
                    Expect(tiles.Re[(l * Channels) + m], _managed[f][l, m].Real);
                    Expect(tiles.Im[(l * Channels) + m], _managed[f][l, m].Imaginary);
                    Expect(tiles.Re[(l * Channels) + m], weight * folded.Re[(l * Channels) + m]);
                    Expect(tiles.Im[(l * Channels) + m], weight * folded.Im[(l * Channels) + m]);
                }
            }
        }
    }

    private static void Expect(double one, double other)
    {
        if (!(Math.Abs(one - other) < 1e-6)) throw new InvalidOperationException($"the candidates differ: {one} and {other}");
    }
}
