using System.Numerics;
using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection.Beams;

/// <summary>
/// What channel faults and their corrections do to the beams that a user forms: array gain of the conventional and the adaptive
/// beam in each look direction. One caller at a time.
/// </summary>
/// <remarks>
/// Array gain is the signal-to-noise ratio at the beam's output over that of one healthy channel,
/// AG = |wᴴs|²/(wᴴ M w) · tr R/N, with R the healthy model's noise covariance, M the noise covariance and s the response to a signal
/// of the data the beamformer is given, and w its weights. The user knows only the nominal steering vector a, so w = a for the
/// conventional beam and w = (M + δ (tr M/N) I)⁻¹ a for the adaptive one (MVDR, Capon 1969; weights from data without the signal, as in Cox,
/// J. Acoust. Soc. Am. 54, 771–785, 1973). Healthy: M = R, s = a. As found: M and s of the faulty data. Corrected: those of the
/// channels left in use, each multiplied by its factor and steered as the sensor whose data it carries.
/// </remarks>
public sealed class BeamEvaluator
{
    /// <summary>The diagonal loading unless another is asked for: 20 dB below the mean power of the channels.</summary>
    public const double DefaultLoading = 0.01;

    /// <summary>The least gain that is reported for a bin, dB: a beam that hears nothing has no gain to speak of.</summary>
    public const double LeastDecibels = -100;

    private readonly ArrayGeometry _geometry;
    private readonly IReadOnlyList<LookDirection> _looks;
    private readonly double _loading;
    private readonly ComplexMatrix _model;
    private readonly double[] _re;
    private readonly double[] _im;

    /// <summary>Prepares for an array and the user's directions.</summary>
    /// <param name="geometry">Where the N channels are.</param>
    /// <param name="looks">The look directions.</param>
    /// <param name="loading">δ, diagonal loading of the adaptive beam as a share of the mean channel power, 0 to 100.</param>
    /// <exception cref="ArgumentOutOfRangeException">A loading out of its range.</exception>
    public BeamEvaluator(ArrayGeometry geometry, IReadOnlyList<LookDirection> looks, double loading = DefaultLoading)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        ArgumentNullException.ThrowIfNull(looks);
        _geometry = geometry;
        _looks = looks;
        _loading = Check.InRange(loading, 0, 100, "the diagonal loading");
        _model = new ComplexMatrix(geometry.Count, geometry.Count);
        _re = new double[geometry.Count];
        _im = new double[geometry.Count];
    }

    /// <summary>Array gains in every look direction, the mean of the decibels over the bins.</summary>
    /// <param name="frequencies">Bin centres, hertz; F of them, at least one.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <param name="copyModel">Writes the healthy model's noise covariance of a bin: N×N, Hermitian, positive trace.</param>
    /// <param name="channels">What each channel really delivers, index 0 first, N of them.</param>
    /// <param name="corrections">What is to be applied; a channel without an entry is used as it is.</param>
    /// <returns>One assessment a look direction, in their order.</returns>
    /// <exception cref="ArgumentException">Lists that do not fit the array and the bins, or a model without power.</exception>
    public IReadOnlyList<BeamAssessment> Assess(
        IReadOnlyList<double> frequencies,
        double soundSpeed,
        Action<int, ComplexMatrix> copyModel,
        IReadOnlyList<ChannelResponse> channels,
        IReadOnlyList<ChannelCorrection> corrections)
    {
        ArgumentNullException.ThrowIfNull(frequencies);
        ArgumentNullException.ThrowIfNull(copyModel);
        Validate(frequencies.Count, channels, corrections);
        Stage[] stages = Stages(channels, corrections);
        double[,] conventional = new double[_looks.Count, stages.Length], adaptive = new double[_looks.Count, stages.Length];
        for (int f = 0; f < frequencies.Count; f++)
        {
            copyModel(f, _model);
            double reference = Trace(_model) / _model.Rows;
            if (!(reference > 0) || !double.IsFinite(reference))
                throw new ArgumentException($"the model of bin {f} has a mean power of {reference}; it must be positive and finite", nameof(copyModel));
            for (int s = 0; s < stages.Length; s++)
            {
                // Where nothing is wrong, or nothing corrected, the stage before says it all: the common case costs a third.
                bool same = s > 0 && stages[s] == stages[s - 1];
                if (!same) stages[s].Data?.Set(_model, stages[s].Deliver, f, _loading);
                for (int d = 0; d < _looks.Count; d++)
                {
                    if (same)
                    {
                        conventional[d, s] = conventional[d, s - 1];
                        adaptive[d, s] = adaptive[d, s - 1];
                        continue;
                    }

                    SteeringVector.PlaneWave(_geometry, _looks[d].Unit, frequencies[f], soundSpeed, _re, _im);
                    stages[s].Data?.Steer(_re, _im, stages[s].SteeredAs);
                    conventional[d, s] += Decibels(reference * (stages[s].Data?.ConventionalRatio() ?? 0)) / frequencies.Count;
                    adaptive[d, s] += Decibels(reference * (stages[s].Data?.AdaptiveRatio() ?? 0)) / frequencies.Count;
                }
            }
        }

        return [.. _looks.Select((look, d) => new BeamAssessment(look, Gains(conventional, d), Gains(adaptive, d)))];

        static BeamGains Gains(double[,] decibels, int d) => new(decibels[d, 0], decibels[d, 1], decibels[d, 2]);
    }

    /// <summary>The array healthy, as found, and corrected; a stage that is no different is the one before.</summary>
    private Stage[] Stages(IReadOnlyList<ChannelResponse> channels, IReadOnlyList<ChannelCorrection> corrections)
    {
        int n = _geometry.Count;
        Stage healthy = new(new BeamData(n), static (_, i) => (i, 1, 0), static i => i);
        bool faultless = Enumerable.Range(0, n).All(i => channels[i].Carries == i
            && channels[i].GainReal.All(g => g == 1) && channels[i].GainImaginary.All(g => g == 0) && channels[i].Noise.All(p => p == 0));
        Stage found = faultless ? healthy : new(new BeamData(n), (bin, i) => Deliver(channels[i], bin, 1), static i => i);
        if (corrections.All(c => c.Use && c.Carries == c.Index && c.GainReal.All(g => g == 1) && c.GainImaginary.All(g => g == 0)))
            return [healthy, found, found];
        (int Channel, int Sensor, ChannelCorrection? Correction)[] used = Used(corrections);
        Stage corrected = new(
            used.Length == 0 ? null : new BeamData(used.Length),
            (bin, i) => Deliver(channels[used[i].Channel], bin, Factor(used[i].Correction, bin)),
            i => used[i].Sensor);
        return [healthy, found, corrected];
    }

    private static (int Sensor, Complex Gain, double Noise) Deliver(ChannelResponse channel, int bin, Complex factor)
        => (channel.Carries,
            factor * new Complex(channel.GainReal[bin], channel.GainImaginary[bin]),
            channel.Noise[bin] * ((factor.Real * factor.Real) + (factor.Imaginary * factor.Imaginary)));

    private static Complex Factor(ChannelCorrection? correction, int bin)
        => correction is null ? 1 : new Complex(correction.GainReal[bin], correction.GainImaginary[bin]);

    private static double Trace(ComplexMatrix m)
    {
        double sum = 0;
        for (int i = 0; i < m.Rows; i++) sum += m.Re[(i * m.Columns) + i];
        return sum;
    }

    private static double Decibels(double gain)
        => gain > 0 ? Math.Max(LeastDecibels, 10 * Math.Log10(gain)) : LeastDecibels;

    /// <summary>The channels left in use, each with the sensor it is steered as.</summary>
    private (int Channel, int Sensor, ChannelCorrection? Correction)[] Used(IReadOnlyList<ChannelCorrection> corrections)
    {
        ChannelCorrection?[] byIndex = new ChannelCorrection?[_geometry.Count];
        foreach (ChannelCorrection c in corrections) byIndex[c.Index] = c;
        return
        [
            .. Enumerable.Range(0, _geometry.Count)
                .Where(i => byIndex[i]?.Use ?? true)
                .Select(i => (i, byIndex[i]?.Carries ?? i, byIndex[i])),
        ];
    }

    private void Validate(int bins, IReadOnlyList<ChannelResponse> channels, IReadOnlyList<ChannelCorrection> corrections)
    {
        ArgumentNullException.ThrowIfNull(channels);
        ArgumentNullException.ThrowIfNull(corrections);
        int n = _geometry.Count;
        if (bins < 1) throw new ArgumentException("at least one bin is needed", nameof(bins));
        if (channels.Count != n) throw new ArgumentException($"{channels.Count} responses do not fit {n} channels", nameof(channels));
        for (int i = 0; i < n; i++)
        {
            ChannelResponse c = channels[i];
            if (c.Carries < 0 || c.Carries >= n) throw new ArgumentException($"channel {i} carries {c.Carries}; 0 to {n - 1} is allowed", nameof(channels));
            if (c.GainReal.Length != bins || c.GainImaginary.Length != bins || c.Noise.Length != bins)
                throw new ArgumentException($"the response of channel {i} does not have {bins} bins", nameof(channels));
        }

        foreach (ChannelCorrection c in corrections)
        {
            if (c.Index < 0 || c.Index >= n || c.Carries < 0 || c.Carries >= n)
                throw new ArgumentException($"a correction of channel {c.Index} that carries {c.Carries}; 0 to {n - 1} is allowed", nameof(corrections));
            if (c.GainReal.Length != bins || c.GainImaginary.Length != bins)
                throw new ArgumentException($"the correction of channel {c.Index} does not have {bins} bins", nameof(corrections));
        }
    }

    /// <summary>What a beamformer is given, null where no channel is left, and the sensor each data channel is steered as.</summary>
    private sealed record Stage(
        BeamData? Data, Func<int, int, (int Sensor, Complex Gain, double Noise)> Deliver, Func<int, int> SteeredAs);
}
