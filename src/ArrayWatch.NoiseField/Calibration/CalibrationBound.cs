using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Factorization;

namespace ArrayWatch.NoiseField.Calibration;

/// <summary>
/// Cramér–Rao bound on the phase and log-gain errors of an array's channels, estimated from sample covariances when the noise
/// field is known: what no unbiased method can beat. Holds the sum of the information of several bins. One caller at a time.
/// </summary>
/// <remarks>
/// With Σ = G R Gᴴ, G = diag(e^(g + jφ)), ν independent snapshots and B_ik = R_ik (R⁻¹)_ki, the Slepian–Bangs formula
/// F_ab = ν tr(Σ⁻¹ ∂_aΣ Σ⁻¹ ∂_bΣ) (Kay, Fundamentals of Statistical Signal Processing, 1993, eq. 15.52) becomes, whatever G,
/// F_φφ = 2ν(Re B − I), F_gg = 2ν(Re B + I), F_φg = −2ν Im B. The rows of B sum to 1, so a phase common to all channels carries
/// no information. An error of the field model is no part of the bound: it comes on top, as a bias.
/// </remarks>
public sealed class CalibrationBound
{
    // An eigenvalue of the information below this share of its natural size is rounding noise.
    private const double Rank = 1e-10;

    private readonly Matrix<double> _information;
    private readonly ComplexMatrix _work;
    private readonly ComplexMatrix _inverse;
    private double _phaseSize;
    private double _gainSize;

    /// <summary>Starts without information.</summary>
    /// <param name="channels">N, at least 2. Cost grows as N³.</param>
    /// <exception cref="ArgumentOutOfRangeException">Fewer than two channels.</exception>
    public CalibrationBound(int channels)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(channels, 2);
        Channels = channels;
        _information = Matrix<double>.Build.Dense(2 * channels, 2 * channels);
        _work = new ComplexMatrix(channels, channels);
        _inverse = new ComplexMatrix(channels, channels);
    }

    /// <summary>Number of channels, N.</summary>
    public int Channels { get; }

    /// <summary>Adds the information of one bin.</summary>
    /// <param name="covariance">
    /// R: N×N, Hermitian, what healthy channels would have, their self-noise included; its scale does not matter.
    /// </param>
    /// <param name="snapshots">ν, effective number of independent snapshots, positive.</param>
    /// <param name="phaseScale">
    /// Radians in this bin for one unit of the phase parameter, not zero: 1 for a phase common to all bins, 2πf for a delay in seconds.
    /// </param>
    /// <returns>False, with nothing added, when R is not positive definite.</returns>
    /// <exception cref="ArgumentException">R is not N×N.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number out of its range.</exception>
    public bool TryAdd(ComplexMatrix covariance, double snapshots, double phaseScale = 1)
    {
        ArgumentNullException.ThrowIfNull(covariance);
        Check.Above(snapshots, 0, "the number of snapshots");
        Check.Above(Math.Abs(phaseScale), 0, "the phase scale", nameof(phaseScale));
        _work.CopyFrom(covariance);
        if (!Hermitian.TryInvert(_work, _inverse, out _)) return false;
        int n = Channels;
        for (int i = 0; i < n; i++)
        {
            for (int k = 0; k < n; k++)
            {
                System.Numerics.Complex b = covariance[i, k] * _inverse[k, i];
                double delta = i == k ? 1 : 0;
                double cross = -2 * snapshots * phaseScale * b.Imaginary;
                _information[i, k] += 2 * snapshots * phaseScale * phaseScale * (b.Real - delta);
                _information[n + i, n + k] += 2 * snapshots * (b.Real + delta);
                _information[i, n + k] += cross;
                _information[n + k, i] += cross;
            }
        }

        _phaseSize += 2 * snapshots * phaseScale * phaseScale;
        _gainSize += 2 * snapshots;
        return true;
    }

    /// <summary>Standard errors at the bound, phases and gains estimated together.</summary>
    /// <param name="gauge">What of the phases is set to zero because the field cannot show it.</param>
    /// <param name="levelKnown">True when the field's absolute level is known; otherwise the mean log-gain is set to zero.</param>
    /// <param name="geometry">Where the N channels are; needed for <see cref="PhaseGauge.ConstantAndLinear"/> alone.</param>
    /// <returns>The errors of all channels; infinite where the field carries no information.</returns>
    /// <exception cref="ArgumentException">A gauge that needs a geometry of N channels without one.</exception>
    public CalibrationErrors StandardErrors(PhaseGauge gauge, bool levelKnown = false, ArrayGeometry? geometry = null)
    {
        int n = Channels;
        if (_phaseSize == 0)
            return new CalibrationErrors([.. Enumerable.Repeat(double.PositiveInfinity, n)], [.. Enumerable.Repeat(double.PositiveInfinity, n)]);

        // In units where each parameter's natural information is one, a single tolerance tells rank from rounding.
        Vector<double> unit = Vector<double>.Build.Dense(2 * n, i => 1 / Math.Sqrt(i < n ? _phaseSize : _gainSize));
        Matrix<double> scaled = Matrix<double>.Build.Dense(2 * n, 2 * n, (i, k) => _information[i, k] * unit[i] * unit[k]);
        List<Vector<double>> gauges = Gauges(gauge, levelKnown, geometry);
        foreach (Vector<double> z in gauges)
        {
            Matrix<double> projector = Matrix<double>.Build.DenseIdentity(2 * n) - z.OuterProduct(z);
            scaled = projector * scaled * projector;
        }

        scaled = (scaled + scaled.Transpose()) / 2;
        Evd<double> evd = scaled.Evd(Symmetricity.Symmetric);
        double[] variance = new double[2 * n];
        bool[] blind = new bool[2 * n];
        double largest = Math.Max(1, evd.EigenValues.Real().Maximum());
        for (int m = 0; m < 2 * n; m++)
        {
            Vector<double> vector = evd.EigenVectors.Column(m);
            double value = evd.EigenValues[m].Real;
            if (value > Rank * largest)
            {
                for (int i = 0; i < 2 * n; i++) variance[i] += vector[i] * vector[i] / value;
                continue;
            }

            // A direction without information, unless it is the gauge itself.
            foreach (Vector<double> z in gauges) vector -= z.DotProduct(vector) * z;
            for (int i = 0; i < 2 * n; i++) blind[i] |= Math.Abs(vector[i]) > 1e-4;
        }

        double Error(int i) => blind[i] ? double.PositiveInfinity : Math.Sqrt(variance[i]) * unit[i];
        return new CalibrationErrors([.. Enumerable.Range(0, n).Select(Error)], [.. Enumerable.Range(n, n).Select(Error)]);
    }

    /// <summary>Orthonormal directions in the 2N parameters that are set to zero.</summary>
    private List<Vector<double>> Gauges(PhaseGauge gauge, bool levelKnown, ArrayGeometry? geometry)
    {
        int n = Channels;
        List<Vector<double>> basis = [];
        Add(i => i < n ? 1 : 0);
        if (!levelKnown) Add(i => i < n ? 0 : 1);
        if (gauge == PhaseGauge.ConstantAndLinear)
        {
            if (geometry is null || geometry.Count != n)
                throw new ArgumentException($"a gauge linear in position needs the geometry of {n} channels", nameof(geometry));
            double aperture = Math.Max(geometry.ApertureMetres, double.Epsilon);
            Add(i => i < n ? (geometry[i].X - geometry.Centroid.X) / aperture : 0);
            Add(i => i < n ? (geometry[i].Y - geometry.Centroid.Y) / aperture : 0);
            Add(i => i < n ? (geometry[i].Z - geometry.Centroid.Z) / aperture : 0);
        }

        return basis;

        void Add(Func<int, double> direction)
        {
            Vector<double> v = Vector<double>.Build.Dense(2 * n, direction);
            // Twice is enough (Kahan, Parlett); what is left of a dependent direction is rounding.
            foreach (Vector<double> z in basis) v -= z.DotProduct(v) * z;
            foreach (Vector<double> z in basis) v -= z.DotProduct(v) * z;
            double length = v.L2Norm();
            if (length > 1e-9) basis.Add(v / length);
        }
    }
}
