using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>
/// One step of Fisher scoring for the channels' log-gains and phases, given the field.
/// </summary>
/// <remarks>
/// With S′ the data with the present gains taken out, R the model, W = R⁻¹, M = W S′ and B = R ∘ Wᵀ, over ν snapshots:
/// score of phase 2ν Im M_ii, of log-gain 2ν (Re M_ii − 1); information 2ν (Re B − I) for phases,
/// 2ν (Re B + I) for log-gains, −2ν Im B between them (Slepian–Bangs, in the form of the project's calibration bound).
/// A Gaussian prior of the spread that healthy channels have stands in for the gauge: a common phase, and a
/// phase linear in position, are otherwise free.
/// </remarks>
public sealed class CalibrationStep
{
    // Spread of healthy channels against each other, 0.4 dB and 3°. Wider ones let gains explain what the sample correlation of two
    // strong arrivals is to blame for, smoothly along the line: measured.
    private const double LogGainSpread = 0.05;
    private const double PhaseSpread = 0.05;

    // A longer step would leave the region where the likelihood is near its quadratic.
    private const double LongestStep = 0.5;

    private readonly FitWorkspace _work;

    /// <summary>Works in the given matrices.</summary>
    public CalibrationStep(FitWorkspace work)
    {
        ArgumentNullException.ThrowIfNull(work);
        _work = work;
    }

    /// <summary>Moves the gains of the trusted channels; the workspace must hold the fit at the present gains.</summary>
    /// <param name="channelNoise">σ² of the fit.</param>
    /// <param name="trusted">Which channels count.</param>
    /// <param name="snapshots">ν, positive.</param>
    /// <param name="logGain">Log-gains, nepers, N values; moved in place.</param>
    /// <param name="phase">Phases, radians, N values; moved in place.</param>
    public void Apply(ReadOnlySpan<double> channelNoise, ReadOnlySpan<bool> trusted, double snapshots, Span<double> logGain, Span<double> phase)
    {
        int n = _work.Channels;
        List<int> index = [];
        for (int i = 0; i < n; i++)
        {
            if (trusted[i]) index.Add(i);
        }

        int t = index.Count, size = 2 * t;
        double[] information = new double[size * size], step = new double[size];
        for (int a = 0; a < t; a++)
        {
            int i = index[a];
            for (int b = 0; b < t; b++)
            {
                int k = index[b];
                double rr = _work.Field.Re[(i * n) + k] + (i == k ? channelNoise[i] : 0), ri = _work.Field.Im[(i * n) + k];
                double wr = _work.Weight.Re[(k * n) + i], wi = _work.Weight.Im[(k * n) + i];
                double re = (rr * wr) - (ri * wi), im = (rr * wi) + (ri * wr);
                double one = a == b ? 1 : 0;
                information[(a * size) + b] = 2 * snapshots * (re - one);
                information[((t + a) * size) + t + b] = 2 * snapshots * (re + one);
                information[(a * size) + t + b] = -2 * snapshots * im;
                information[((t + b) * size) + a] = -2 * snapshots * im;
            }

            information[(a * size) + a] += 1 / (PhaseSpread * PhaseSpread);
            information[((t + a) * size) + t + a] += 1 / (LogGainSpread * LogGainSpread);
            step[a] = (2 * snapshots * _work.WeightData.Im[(i * n) + i]) - (phase[i] / (PhaseSpread * PhaseSpread));
            step[t + a] = (2 * snapshots * (_work.WeightData.Re[(i * n) + i] - 1)) - (logGain[i] / (LogGainSpread * LogGainSpread));
        }

        if (!RealCholesky.TryFactor(information, size)) return;
        RealCholesky.Solve(information, size, step);
        double longest = 0;
        foreach (double s in step) longest = Math.Max(longest, Math.Abs(s));
        double scale = longest > LongestStep ? LongestStep / longest : 1;
        for (int a = 0; a < t; a++)
        {
            phase[index[a]] += scale * step[a];
            logGain[index[a]] += scale * step[t + a];
        }
    }
}
