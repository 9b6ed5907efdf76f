using System.Numerics;
using ArrayWatch.NoiseField.Calibration;
using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Tests.Signals.Statistics;

namespace ArrayWatch.Tests.NoiseField.Calibration;

public sealed class CalibrationBoundTests
{
    private const double Degrees = 180 / Math.PI;
    private const double Decibels = 8.685889638065037;

    // The trace formula on this array, N = 8, R = sinc(kd|i−j|) + 0.01 I, ν = 1000, recomputed and confirmed by a Monte Carlo of a
    // scoring estimator (variance/bound 0.98 to 1.01).
    [Theory]
    [InlineData(0.25, new[] { 0.61649067, 0.40446324, 0.28710320, 0.21398652 }, new[] { 0.08241634, 0.06506496, 0.05965850, 0.05686257 })]
    [InlineData(0.5, new[] { 0.84241087, 0.51839898, 0.36563484, 0.29942823 }, new[] { 0.09538198, 0.07164514, 0.06395609, 0.06235214 })]
    [InlineData(0.8, new[] { 1.49535730, 1.07859187, 0.86543025, 0.77124496 }, new[] { 0.12032621, 0.10996721, 0.10213268, 0.09808628 })]
    public void A_line_in_isotropic_noise_has_the_tabulated_bounds(double kdOverPi, double[] phaseDegrees, double[] gainDecibels)
    {
        CalibrationBound bound = new(8);
        Assert.True(bound.TryAdd(Isotropic(8, kdOverPi), 1000));
        CalibrationErrors errors = bound.StandardErrors(PhaseGauge.Constant, levelKnown: true);
        for (int i = 0; i < 8; i++)
        {
            int j = Math.Min(i, 7 - i);
            ReferenceValues.Near(phaseDegrees[j], errors.Phase[i] * Degrees, 1e-7);
            ReferenceValues.Near(gainDecibels[j], errors.LogGain[i] * Decibels, 1e-6);
        }
    }

    [Fact]
    public void An_unknown_level_leaves_the_zero_mean_gains()
    {
        CalibrationBound bound = new(8);
        bound.TryAdd(Isotropic(8, 0.5), 1000);
        double[] gains = bound.StandardErrors(PhaseGauge.Constant).LogGain;
        double[] expected = [0.08209796, 0.05268188, 0.04162613, 0.03911704];
        for (int i = 0; i < 4; i++) ReferenceValues.Near(expected[i], gains[i] * Decibels, 1e-6);
    }

    // White noise says nothing of phase: isotropic noise at half-wavelength spacing, F_φφ = 0; gains still to 1/√(4ν).
    [Fact]
    public void White_noise_carries_no_phase()
    {
        CalibrationBound bound = new(8);
        bound.TryAdd(Isotropic(8, 1), 1000);
        CalibrationErrors errors = bound.StandardErrors(PhaseGauge.Constant, levelKnown: true);
        Assert.All(errors.Phase, e => Assert.Equal(double.PositiveInfinity, e));
        Assert.All(errors.LogGain, e => ReferenceValues.Near(0.13733597, e * Decibels, 1e-6));
    }

    // Two channels: var(φ₂ − φ₁) = (1 − C)/(2νC), the classic phase error of a cross-spectrum (Bendat and Piersol).
    [Fact]
    public void Two_channels_have_the_phase_error_of_a_cross_spectrum()
    {
        ComplexMatrix r = new(2, 2);
        (r[0, 0], r[1, 1]) = (2, 3);
        r[0, 1] = Complex.FromPolarCoordinates(Math.Sqrt(0.5 * 6), 0.7);
        r[1, 0] = Complex.Conjugate(r[0, 1]);
        CalibrationBound bound = new(2);
        bound.TryAdd(r, 100);
        double[] phases = bound.StandardErrors(PhaseGauge.Constant).Phase;
        Assert.Equal(Math.Sqrt(0.5 / (2 * 100 * 0.5)), 2 * phases[0], 1e-12);
        Assert.Equal(phases[0], phases[1], 1e-12);
    }

    // Brute-force Slepian–Bangs traces with a complex R (isotropic noise and a plane wave), by SciPy.
    [Theory]
    [InlineData("crb_constant", PhaseGauge.Constant, false)]
    [InlineData("crb_linear", PhaseGauge.ConstantAndLinear, false)]
    [InlineData("crb_level", PhaseGauge.Constant, true)]
    public void A_complex_field_agrees_with_the_trace_formula(string name, PhaseGauge gauge, bool levelKnown)
    {
        (ArrayGeometry geometry, ComplexMatrix r) = ComplexField();
        CalibrationBound bound = new(6);
        bound.TryAdd(r, 300);
        CalibrationErrors errors = bound.StandardErrors(gauge, levelKnown, geometry);
        foreach ((double[] a, double value) in ReferenceValues.Of(name))
        {
            int i = (int)a[0];
            ReferenceValues.Near(value, i < 6 ? errors.Phase[i] : errors.LogGain[i - 6], 1e-9);
        }
    }

    [Fact]
    public void The_bound_does_not_depend_on_the_channels_own_gains_nor_on_the_level()
    {
        (_, ComplexMatrix r) = ComplexField();
        ComplexMatrix changed = new(6, 6);
        Complex[] gains = [.. Enumerable.Range(0, 6).Select(i => Complex.FromPolarCoordinates(3 + i, 0.9 * i))];
        for (int i = 0; i < 6; i++)
            for (int k = 0; k < 6; k++) changed[i, k] = gains[i] * r[i, k] * Complex.Conjugate(gains[k]);
        CalibrationBound first = new(6), second = new(6);
        first.TryAdd(r, 50);
        second.TryAdd(changed, 50);
        CalibrationErrors a = first.StandardErrors(PhaseGauge.Constant), b = second.StandardErrors(PhaseGauge.Constant);
        for (int i = 0; i < 6; i++)
        {
            ReferenceValues.Near(a.Phase[i], b.Phase[i], 1e-9);
            ReferenceValues.Near(a.LogGain[i], b.LogGain[i], 1e-9);
        }
    }

    [Fact]
    public void Bins_add_up_and_a_delay_has_the_phase_error_over_two_pi_f()
    {
        (_, ComplexMatrix r) = ComplexField();
        CalibrationBound once = new(6), twice = new(6), delay = new(6);
        once.TryAdd(r, 50);
        twice.TryAdd(r, 20);
        twice.TryAdd(r, 30);
        delay.TryAdd(r, 50, 2 * Math.PI * 300);
        double expected = once.StandardErrors(PhaseGauge.Constant).Phase[2];
        ReferenceValues.Near(expected, twice.StandardErrors(PhaseGauge.Constant).Phase[2], 1e-9);
        ReferenceValues.Near(expected / (2 * Math.PI * 300), delay.StandardErrors(PhaseGauge.Constant).Phase[2], 1e-9);
    }

    [Fact]
    public void Nothing_known_is_infinite_and_a_bad_matrix_is_told()
    {
        CalibrationBound bound = new(3);
        Assert.Equal(double.PositiveInfinity, bound.StandardErrors(PhaseGauge.Constant).Phase[0]);
        Assert.False(bound.TryAdd(new ComplexMatrix(3, 3), 10));
        Assert.Throws<ArgumentException>(() => bound.TryAdd(new ComplexMatrix(2, 2), 10));
        Assert.Throws<ArgumentOutOfRangeException>(() => bound.TryAdd(new ComplexMatrix(3, 3), double.NaN));
        Assert.True(bound.TryAdd(Isotropic(3, 0.5), 10));
        Assert.Throws<ArgumentException>(() => bound.StandardErrors(PhaseGauge.ConstantAndLinear));
    }

    private static ComplexMatrix Isotropic(int n, double kdOverPi)
    {
        ComplexMatrix r = new(n, n);
        CoherenceMatrix.Fill(
            ArrayGeometry.UniformLine(n, 1, new(1, 0, 0)), d => IsotropicNoise.Spherical(d, kdOverPi * 750, 1500), r);
        for (int i = 0; i < n; i++) r[i, i] += 0.01;
        return r;
    }

    /// <summary>The scene of tests/reference/physics.py.</summary>
    private static (ArrayGeometry Geometry, ComplexMatrix R) ComplexField()
    {
        double[] x = [0, 1, 2.1, 2.9, 4.2, 5];
        ArrayGeometry geometry = new(x.Select((v, i) => new Channel($"{i}", new Position(v, 0, 0))));
        ComplexMatrix r = new(6, 6);
        for (int i = 0; i < 6; i++)
        {
            for (int k = 0; k < 6; k++)
            {
                double d = x[i] - x[k];
                r[i, k] = IsotropicNoise.Sinc(1.3 * d) + (0.5 * Complex.FromPolarCoordinates(1, 0.52 * d)) + (i == k ? 0.05 : 0);
            }
        }

        return (geometry, r);
    }
}
