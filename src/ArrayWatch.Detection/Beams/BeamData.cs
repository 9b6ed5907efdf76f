using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection.Beams;

/// <summary>
/// The data that a beamformer is given at one bin, by their second moments: noise covariance M and response s to a signal, beside
/// the steering vector a that the user believes in.
/// </summary>
/// <param name="count">Number of data channels, U.</param>
internal sealed class BeamData(int count)
{
    private readonly ComplexMatrix _noise = new(count, count);
    private readonly ComplexMatrix _loaded = new(count, count);
    private readonly ComplexMatrix _inverse = new(count, count);
    private readonly (int Sensor, Complex Gain)[] _delivered = new (int, Complex)[count];
    private readonly Complex[] _steering = new Complex[count];
    private readonly Complex[] _response = new Complex[count];
    private readonly Complex[] _weights = new Complex[count];
    private bool _invertible;

    /// <summary>Sets M and (M + loading · tr M/U · I)⁻¹.</summary>
    /// <param name="model">Covariance of what the sensors receive.</param>
    /// <param name="deliver">For a bin and a data channel: the sensor it carries, its complex gain, and the power of its own noise.</param>
    /// <param name="bin">The bin.</param>
    /// <param name="loading">As a share of the mean channel power.</param>
    public void Set(ComplexMatrix model, Func<int, int, (int Sensor, Complex Gain, double Noise)> deliver, int bin, double loading)
    {
        double trace = 0;
        for (int i = 0; i < count; i++)
        {
            (int sensor, Complex gain, double noise) = deliver(bin, i);
            _delivered[i] = (sensor, gain);
            for (int k = 0; k <= i; k++)
            {
                Complex value = gain * model[sensor, _delivered[k].Sensor] * Complex.Conjugate(_delivered[k].Gain);
                if (k == i) value = value.Real + noise;
                _noise[i, k] = value;
                _noise[k, i] = Complex.Conjugate(value);
            }

            trace += _noise[i, i].Real;
        }

        _loaded.CopyFrom(_noise);
        for (int i = 0; i < count; i++) _loaded.Re[(i * count) + i] += loading * trace / count;
        _invertible = Hermitian.TryInvert(_loaded, _inverse, out _);
    }

    /// <summary>Sets a and s from the plane wave's values at the sensors.</summary>
    /// <param name="re">Real parts at the sensors.</param>
    /// <param name="im">Imaginary parts at the sensors.</param>
    /// <param name="steeredAs">For a data channel, the sensor the user takes it for.</param>
    public void Steer(ReadOnlySpan<double> re, ReadOnlySpan<double> im, Func<int, int> steeredAs)
    {
        for (int i = 0; i < count; i++)
        {
            int nominal = steeredAs(i);
            (int sensor, Complex gain) = _delivered[i];
            _steering[i] = new Complex(re[nominal], im[nominal]);
            _response[i] = gain * new Complex(re[sensor], im[sensor]);
        }
    }

    /// <summary>|aᴴs|²/(aᴴ M a): output signal over output noise of delay-and-sum, for unit signal power.</summary>
    public double ConventionalRatio() => Ratio(_steering);

    /// <summary>The same with w = (M + loading)⁻¹ a; 0 where the matrix has no inverse, as when every channel is silent.</summary>
    public double AdaptiveRatio()
    {
        if (!_invertible) return 0;
        for (int i = 0; i < count; i++)
        {
            Complex sum = 0;
            for (int k = 0; k < count; k++) sum += _inverse[i, k] * _steering[k];
            _weights[i] = sum;
        }

        return Ratio(_weights);
    }

    private double Ratio(Complex[] w)
    {
        Complex signal = 0;
        double noise = 0;
        for (int i = 0; i < count; i++)
        {
            signal += Complex.Conjugate(w[i]) * _response[i];
            Complex row = 0;
            for (int k = 0; k < count; k++) row += _noise[i, k] * w[k];
            noise += (w[i].Real * row.Real) + (w[i].Imaginary * row.Imaginary);
        }

        return noise > 0 ? ((signal.Real * signal.Real) + (signal.Imaginary * signal.Imaginary)) / noise : 0;
    }
}
