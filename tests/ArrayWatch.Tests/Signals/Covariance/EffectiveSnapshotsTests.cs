using ArrayWatch.Signals.Covariance;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.Covariance;

public sealed class EffectiveSnapshotsTests
{
    /// <summary>(1+λ)/(1−λ): λ = 0.5 → 3; 0.9 → 19; 0.95 → 39; 0.99 → 199 (geometric series).</summary>
    [Theory]
    [InlineData(0.5, 3)]
    [InlineData(0.9, 19)]
    [InlineData(0.95, 39)]
    [InlineData(0.99, 199)]
    public void Without_overlap_the_settled_number_is_the_closed_form(double lambda, double expected) =>
        Assert.Equal(expected, Settled(lambda, 0), 1e-8);

    /// <summary>Hann windows at one half: [(1+λ)/(1−λ)]/(1+λ/18), since c(1/2) = 1/6 and c² = 1/36 (Welch 1967).</summary>
    [Theory]
    [InlineData(0.9, 18.0952380952)]
    [InlineData(0.95, 37.0448548813)]
    [InlineData(0.99, 188.6255924270)]
    public void With_half_overlap_the_settled_number_is_the_closed_form(double lambda, double expected) =>
        Assert.Equal(expected, Settled(lambda, 0.5), 1e-8);

    /// <summary>Welch 1967: L/(1+2Σ(1−j/L)ρ_j) of equal weights, Hann at one half; the same numbers by hand.</summary>
    [Theory]
    [InlineData(2, 1.94594595)]
    [InlineData(3, 2.89285714)]
    [InlineData(7, 6.68181818)]
    [InlineData(127, 120.36567164)]
    public void Equal_weights_give_Welchs_number(int snapshots, double expected)
    {
        var effective = new EffectiveSnapshots();
        double[] correlations = WindowOverlap.PowerCorrelations(0.5);
        for (int k = 0; k < snapshots; k++) effective.Add(1, correlations);
        Assert.Equal(expected, effective.Count, 1e-8);
    }

    /// <summary>Harris 1978, table I: Hann 65.9 % and 16.7 % at three quarters and one half overlap; 0.007512 by quadrature.</summary>
    [Fact]
    public void Correlations_of_Hann_windows_are_the_published_ones()
    {
        Assert.Equal(1, WindowOverlap.HannCorrelation(0), 1e-15);
        Assert.Equal(0.659155, WindowOverlap.HannCorrelation(0.25), 1e-6);
        Assert.Equal(1.0 / 6, WindowOverlap.HannCorrelation(0.5), 1e-15);
        Assert.Equal(0.007512, WindowOverlap.HannCorrelation(0.75), 1e-6);
        Assert.Equal(0, WindowOverlap.HannCorrelation(1));
        Assert.Equal(3, WindowOverlap.PowerCorrelations(0.75).Length);
        Assert.Empty(WindowOverlap.PowerCorrelations(0));
        Assert.Equal(999, WindowOverlap.PowerCorrelations(0.99999).Length);
    }

    [Fact]
    public void Windows_on_either_side_of_a_gap_share_nothing()
    {
        var effective = new EffectiveSnapshots();
        double[] correlations = WindowOverlap.PowerCorrelations(0.5);
        effective.Add(1, correlations);
        effective.Break();
        effective.Add(1, correlations);
        Assert.Equal(2, effective.Count, 1e-12);
    }

    /// <summary>
    /// White noise through Hann windows of 32 samples: mean²/variance of the averaged power. 6000 runs tell it to
    /// about 2 %; the test allows 10 %, so that it fails by chance less than once in a million.
    /// </summary>
    [Theory]
    [InlineData(0, 32)]
    [InlineData(0.5, 16)]
    [InlineData(0.75, 8)]
    public void The_number_is_what_a_simulation_finds(double overlap, int hop)
    {
        const int Runs = 6000, Snapshots = 80, Length = 32;
        var random = new Random(20270111);
        double[] window = [.. Enumerable.Range(0, Length).Select(i => 0.5 - (0.5 * Math.Cos(2 * Math.PI * i / Length)))];
        float[] data = new float[2 * Snapshots];
        double[] samples = new double[2 * (((Snapshots - 1) * hop) + Length)];
        double sum = 0, squares = 0, freedom = 0;
        var s = new ComplexMatrix(1, 1);
        for (int run = 0; run < Runs; run++)
        {
            for (int i = 0; i < samples.Length; i++) samples[i] = (3.4641016 * random.NextDouble()) - 1.7320508;
            for (int k = 0; k < Snapshots; k++)
            {
                double re = 0, im = 0;
                for (int i = 0; i < Length; i++)
                {
                    re += window[i] * samples[2 * ((k * hop) + i)];
                    im += window[i] * samples[(2 * ((k * hop) + i)) + 1];
                }

                (data[2 * k], data[(2 * k) + 1]) = ((float)re, (float)im);
            }

            // λ = exp(−0.1): settled to exp(−8).
            var covariance = new ExponentialCovariance(1, 1, TimeSpan.FromSeconds(10));
            covariance.Fold(data, Snapshots, 1, overlap);
            covariance.CopyBin(0, s);
            sum += s.Re[0];
            squares += s.Re[0] * s.Re[0];
            freedom = covariance.DegreesOfFreedom;
        }

        double mean = sum / Runs, found = mean * mean / ((squares / Runs) - (mean * mean));
        Assert.InRange(found / freedom, 0.9, 1.1);
    }

    private static double Settled(double lambda, double overlap)
    {
        var covariance = new ExponentialCovariance(1, 1, TimeSpan.FromSeconds(1));
        covariance.Fold(new float[2 * 8000], 8000, -Math.Log(lambda), overlap);
        return covariance.DegreesOfFreedom;
    }
}
