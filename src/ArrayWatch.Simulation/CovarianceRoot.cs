using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Simulation;

/// <summary>
/// A lower-triangular L with L Lᴴ = R for a positive semidefinite R, to draw Gaussian vectors of that
/// covariance. Seventy decibels below the power a little noise is added: at low frequency a diffuse field has far
/// fewer directions than there are sensors, and without it rounding grows along the factor until the last sensors are wrong
/// by decibels.
/// </summary>
internal sealed class CovarianceRoot
{
    private const double RelativeFloor = 1e-7;
    private readonly int _n;
    private readonly double[] _re;
    private readonly double[] _im;

    public CovarianceRoot(ComplexMatrix covariance)
    {
        _n = covariance.Rows;
        _re = (double[])covariance.Re.Clone();
        _im = (double[])covariance.Im.Clone();
        double largest = 0;
        for (int i = 0; i < _n; i++) largest = Math.Max(largest, _re[(i * _n) + i]);
        for (int i = 0; i < _n; i++) _re[(i * _n) + i] += RelativeFloor * largest;
        for (int j = 0; j < _n; j++) FactorColumn(j);
    }

    /// <summary>Adds L z to the planes for a standard complex Gaussian z, scaled by <paramref name="amplitude"/>.</summary>
    public void AddDraw(double amplitude, RandomNumbers random, Span<double> re, Span<double> im)
    {
        Span<double> zr = stackalloc double[_n], zi = stackalloc double[_n];
        for (int i = 0; i < _n; i++) (zr[i], zi[i]) = random.NextComplexGaussian();
        for (int i = 0; i < _n; i++)
        {
            double sr = 0, si = 0;
            ReadOnlySpan<double> lr = _re.AsSpan(i * _n, i + 1), li = _im.AsSpan(i * _n, i + 1);
            for (int k = 0; k < lr.Length; k++)
            {
                sr += (lr[k] * zr[k]) - (li[k] * zi[k]);
                si += (lr[k] * zi[k]) + (li[k] * zr[k]);
            }

            re[i] += amplitude * sr;
            im[i] += amplitude * si;
        }
    }

    private void FactorColumn(int j)
    {
        double d = _re[(j * _n) + j];
        for (int k = 0; k < j; k++) d -= Square(j, k);
        double root = Math.Sqrt(Math.Max(d, 0));
        _re[(j * _n) + j] = root;
        _im[(j * _n) + j] = 0;
        for (int i = j + 1; i < _n; i++)
        {
            double sr = _re[(i * _n) + j], si = _im[(i * _n) + j];
            for (int k = 0; k < j; k++)
            {
                double ar = _re[(i * _n) + k], ai = _im[(i * _n) + k], br = _re[(j * _n) + k], bi = _im[(j * _n) + k];
                sr -= (ar * br) + (ai * bi);
                si -= (ai * br) - (ar * bi);
            }

            _re[(i * _n) + j] = root > 0 ? sr / root : 0;
            _im[(i * _n) + j] = root > 0 ? si / root : 0;
        }
    }

    private double Square(int i, int k) => (_re[(i * _n) + k] * _re[(i * _n) + k]) + (_im[(i * _n) + k] * _im[(i * _n) + k]);
}
