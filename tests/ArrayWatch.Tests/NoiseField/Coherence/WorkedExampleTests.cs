using System.Numerics;
using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.NoiseField.Coherence;

/// <summary>
/// Facts of covariance algebra on a 4×4 example in exact short decimals, all recomputed in rational
/// arithmetic, and the structure of a uniform line in a homogeneous field (Van Trees, Optimum Array
/// Processing, 2002).
/// </summary>
public sealed class WorkedExampleTests
{
    private static readonly ComplexMatrix S = Matrix(
        new(2, 0), new(0.6, 0.3), new(-0.2, 0.4), new(0.1, -0.1),
        new(0.6, -0.3), new(1.5, 0), new(0.5, -0.2), new(0, 0.3),
        new(-0.2, -0.4), new(0.5, 0.2), new(1.8, 0), new(0.7, 0.1),
        new(0.1, 0.1), new(0, -0.3), new(0.7, -0.1), new(1.2, 0));

    private static readonly ComplexMatrix A = Matrix(
        new(1.25, 0.5), new(-0.25, 0), new(0, 0.5), new(0.125, 0),
        new(0.25, -0.25), new(0.75, 0), new(0.5, 0), new(0, -0.5),
        new(0.5, 0), new(0, 0.125), new(1.5, -0.25), new(0.25, 0),
        new(0, -0.125), new(0.25, 0.5), new(-0.5, 0), new(1, 0));

    private static readonly ComplexMatrix W = Row(new(0.25, 0.1), new(0.3, -0.05), new(0, -0.2), new(0.15, 0));

    // y = A x has covariance A S Aᴴ.
    [Fact]
    public void A_linear_map_takes_the_covariance_to_A_S_A_hermitian()
    {
        ComplexMatrix product = Mapped();
        Complex[,] upper =
        {
            { new(4.36875, 0), new(0.14375, 2.359375), new(0.3953125, 2.4125), new(0.8703125, 0.0109375) },
            { default, new(2.38125, 0), new(2.540625, -0.96875), new(0.209375, -0.80625) },
            { default, default, new(4.9859375, 0), new(0.5375, -0.3265625) },
            { default, default, default, new(0.79375, 0) },
        };
        for (int i = 0; i < 4; i++)
        {
            for (int j = i; j < 4; j++)
            {
                Assert.Equal(upper[i, j].Real, product[i, j].Real, 1e-12);
                Assert.Equal(upper[i, j].Imaginary, product[i, j].Imaginary, 1e-12);
                Assert.Equal(-upper[i, j].Imaginary, product[j, i].Imaginary, 1e-12);
            }
        }
    }

    // 2081/4000 exactly; 0.46425 would be the conjugate in the wrong place.
    [Fact]
    public void Output_power_is_w_hermitian_S_w()
    {
        double[] form = new double[1];
        Products.QuadraticForms(W, S, form);
        Assert.Equal(2081.0 / 4000, form[0], 1e-15);
        Products.QuadraticForms(W, Mapped(), form);
        Assert.Equal(1.2511015625, form[0], 1e-14);
    }

    [Fact]
    public void Inverse_determinant_and_capon_power_are_exact()
    {
        ComplexMatrix copy = new(4, 4), inverse = new(4, 4);
        copy.CopyFrom(S);
        Assert.True(Hermitian.TryInvert(copy, inverse, out double logDeterminant));
        Assert.Equal(Math.Log(2.176), logDeterminant, 1e-13);
        Assert.Equal(0.885110294118, inverse[0, 0].Real, 1e-12);
        Assert.Equal(-0.638786764706, inverse[0, 1].Real, 1e-12);
        Assert.Equal(-0.177389705882, inverse[0, 1].Imaginary, 1e-12);
        double[] form = new double[1];
        Products.QuadraticForms(Row(1, 1, 1, 1), inverse, form);
        Assert.Equal(4.0 / 7, 1 / form[0], 1e-13);
    }

    [Fact]
    public void A_uniform_line_in_a_homogeneous_field_is_toeplitz_and_persymmetric()
    {
        const int N = 9;
        ArrayGeometry line = ArrayGeometry.UniformLine(N, 0.4, new(1, 2, -0.5));
        ComplexMatrix r = new(N, N);
        CoherenceMatrix.Fill(
            line,
            d => SurfaceNoise.Coherence(d, new(0, 0, 1), 700, 1500) + (0.3 * DirectionalNoise.Spherical(d, new(1, 0, 0), 4, 700, 1500)) - (d == default ? 0.3 : 0),
            r);
        for (int i = 1; i < N; i++)
        {
            for (int j = 1; j < N; j++)
            {
                if (i != j) Near(r[i - 1, j - 1], r[i, j]);
                Near(Complex.Conjugate(r[N - 1 - i, N - 1 - j]), r[i, j]);
            }
        }

        static void Near(Complex expected, Complex actual) => Assert.True((expected - actual).Magnitude < 1e-12);
    }

    private static ComplexMatrix Mapped()
    {
        ComplexMatrix left = new(4, 4), hermitian = new(4, 4), result = new(4, 4);
        for (int i = 0; i < 4; i++)
            for (int j = 0; j < 4; j++) hermitian[i, j] = Complex.Conjugate(A[j, i]);
        Products.Multiply(A, S, left);
        Products.Multiply(left, hermitian, result);
        return result;
    }

    private static ComplexMatrix Matrix(params Complex[] values)
    {
        ComplexMatrix m = new(4, 4);
        for (int i = 0; i < 16; i++) m[i / 4, i % 4] = values[i];
        return m;
    }

    private static ComplexMatrix Row(params Complex[] values)
    {
        ComplexMatrix m = new(1, values.Length);
        for (int i = 0; i < values.Length; i++) m[0, i] = values[i];
        return m;
    }
}
