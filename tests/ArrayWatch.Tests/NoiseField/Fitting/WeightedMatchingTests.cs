using ArrayWatch.NoiseField;
using ArrayWatch.NoiseField.Fitting;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.NoiseField.Fitting;

public sealed class WeightedMatchingTests
{
    // Common practice, no source: a fit to the exact covariance of a field that the model holds reproduces it.
    [Theory]
    [InlineData(200)]
    [InlineData(500)]
    [InlineData(900)]
    public void It_reproduces_a_field_that_it_can_hold(double frequency)
    {
        ArrayGeometry geometry = ArrayGeometry.UniformLine(16, 0.75, new Position(1, 0, 0));
        FieldBasis basis = new(
            new FieldContext(geometry, new ArrayShape(geometry), frequency, 1500, [], 0), FieldComponents.Find(["isotropic", "plane-waves", "channel-noise"]));
        FieldPowers truth = new(basis);
        truth.Dense[0] = 1;
        truth.Waves[basis.Directions.Length / 3] = 4;
        FitWorkspace work = new(16);
        truth.WriteField(work.Data);
        for (int i = 0; i < 16; i++) work.Data.Re[(i * 16) + i] += 0.05;
        ComplexMatrix expected = new(16, 16);
        expected.CopyFrom(work.Data);

        bool[] trusted = [.. Enumerable.Repeat(true, 16)];
        FieldPowers fit = new(basis);
        Assert.True(new WeightedMatching(work).TryFit(fit, trusted, 12));
        double missed = 0, whole = 0;
        for (int i = 0; i < 256; i++)
        {
            double own = i % 17 == 0 ? fit.ChannelNoise[i / 17] : 0;
            double re = work.Field.Re[i] + own - expected.Re[i], im = work.Field.Im[i] - expected.Im[i];
            missed += (re * re) + (im * im);
            whole += (expected.Re[i] * expected.Re[i]) + (expected.Im[i] * expected.Im[i]);
        }

        Assert.InRange(Math.Sqrt(missed / whole), 0, 0.02);
        Assert.All(fit.Waves, s => Assert.True(s >= 0));
    }

    [Fact]
    public void Least_squares_meets_the_Karush_Kuhn_Tucker_conditions()
    {
        Random random = new(99);
        double[] a = [.. Enumerable.Range(0, 30 * 8).Select(_ => random.NextDouble() - 0.3)], b = [.. Enumerable.Range(0, 30).Select(_ => random.NextDouble() - 0.5)];
        double[] gram = new double[64], right = new double[8], x = new double[8];
        for (int i = 0; i < 8; i++)
        {
            for (int j = 0; j < 8; j++) gram[(i * 8) + j] = Enumerable.Range(0, 30).Sum(k => a[(k * 8) + i] * a[(k * 8) + j]);
            right[i] = Enumerable.Range(0, 30).Sum(k => a[(k * 8) + i] * b[k]);
        }

        NonNegativeLeastSquares.Solve(gram, right, x, 1e-12, 10_000);
        for (int i = 0; i < 8; i++)
        {
            double gradient = Enumerable.Range(0, 8).Sum(j => gram[(i * 8) + j] * x[j]) - right[i];
            Assert.True(x[i] >= 0);
            if (x[i] > 0) Assert.InRange(gradient, -1e-8, 1e-8);
            else Assert.True(gradient >= -1e-8);
        }
    }
}
