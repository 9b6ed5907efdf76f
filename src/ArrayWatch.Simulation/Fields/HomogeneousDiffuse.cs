using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Simulation.Fields;

/// <summary>A diffuse source that is even over the array: its covariance depends on p_l − p_m only.</summary>
public abstract record HomogeneousDiffuse : DiffuseSource
{
    /// <inheritdoc/>
    public sealed override void AddCovariance(SoundMoment moment, ComplexMatrix covariance)
    {
        ArgumentNullException.ThrowIfNull(covariance);
        double power = Spectrum.PowerAt(moment.FrequencyHertz);
        int n = moment.Positions.Length;
        for (int l = 0; l < n; l++)
        {
            covariance.Re[(l * n) + l] += power;
            for (int m = 0; m < l; m++)
            {
                (double re, double im) = Coherence(moment.Positions[l] - moment.Positions[m], moment);
                covariance.Re[(l * n) + m] += power * re;
                covariance.Im[(l * n) + m] += power * im;
                covariance.Re[(m * n) + l] += power * re;
                covariance.Im[(m * n) + l] -= power * im;
            }
        }
    }

    /// <summary>Complex coherence of two sensors, E[x_l x_m*] for unit power.</summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="moment">Sound speed and frequency.</param>
    protected abstract (double Re, double Im) Coherence(Position separation, SoundMoment moment);
}
