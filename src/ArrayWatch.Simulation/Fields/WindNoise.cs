using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Pressure of turbulence that the wind carries over microphones: coherence of the Corcos form
/// e^{−α₁ω|ξ|/Uc} e^{−α₂ω|η|/Uc} e^{−jωξ/Uc} with ξ along the wind and η across it, α₁ = 0.125, α₂ = 0.7,
/// Uc = 0.8 U (D. Mirabilii, E. A. P. Habets, arXiv 1805.09679, 2018). A sensor downwind lags.
/// </summary>
public sealed record WindNoise : DiffuseSource
{
    /// <summary>Where the wind blows to, radians from x toward y.</summary>
    public required double TowardRadians { get; init; }

    /// <summary>Wind speed U, m/s, positive.</summary>
    public required double SpeedMetresPerSecond { get; init; }

    /// <summary>How much each channel catches above the mean (its screen, its height), dB; empty for evenly.</summary>
    public IReadOnlyList<double> ChannelDecibels { get; init; } = [];

    /// <summary>Decay along the wind, α₁.</summary>
    public double AlongDecay { get; init; } = 0.125;

    /// <summary>Decay across the wind, α₂.</summary>
    public double AcrossDecay { get; init; } = 0.7;

    /// <summary>Speed of the eddies over the wind's, Uc/U.</summary>
    public double ConvectionRatio { get; init; } = 0.8;

    /// <inheritdoc/>
    public override void AddCovariance(SoundMoment moment, ComplexMatrix covariance)
    {
        ArgumentNullException.ThrowIfNull(covariance);
        double power = Spectrum.PowerAt(moment.FrequencyHertz);
        double rate = 2 * Math.PI * moment.FrequencyHertz / (ConvectionRatio * SpeedMetresPerSecond);
        Position along = Position.Direction(TowardRadians, 0);
        int n = moment.Positions.Length;
        for (int l = 0; l < n; l++)
        {
            covariance.Re[(l * n) + l] += power * Strength(l) * Strength(l);
            for (int m = 0; m < l; m++)
            {
                Position d = moment.Positions[l] - moment.Positions[m];
                double xi = d.Dot(along), eta = (d - (xi * along)).Length;
                double magnitude = power * Strength(l) * Strength(m) * Math.Exp(-rate * ((AlongDecay * Math.Abs(xi)) + (AcrossDecay * eta)));
                double re = magnitude * Math.Cos(rate * xi), im = -magnitude * Math.Sin(rate * xi);
                covariance.Re[(l * n) + m] += re;
                covariance.Im[(l * n) + m] += im;
                covariance.Re[(m * n) + l] += re;
                covariance.Im[(m * n) + l] -= im;
            }
        }
    }

    private double Strength(int channel) => ChannelDecibels.Count == 0 ? 1 : Decibels.ToAmplitude(ChannelDecibels[channel]);
}
