namespace ArrayWatch.Detection.Fitting;

/// <summary>What all bins together say of one channel at one decision. Immutable.</summary>
internal sealed class ChannelSummary
{
    // A bin whose response is less certain than this tells nothing of phase or gain.
    private const double LargestUsefulError = 0.7;

    // Coherence with the prediction below which a channel's response cannot be seen in this field.
    private const double LeastVisible = 0.04;

    private const double DecibelsPerNeper = 8.685889638065037;

    public ChannelSummary(int index, IReadOnlyList<BinEvidence> bins, Tolerances tolerances)
    {
        Index = index;
        BinEvidence[] usable = [.. bins.Where(b => b.Usable)];
        Bins = usable.Length;
        double level = 0, all = 0, kept = 0, expected = 0, snapshots = 0;
        foreach (BinEvidence b in bins)
        {
            level += b.Level[index];
            all++;
        }

        Level = all > 0 ? level / all : 0;
        LevelDecibels = ToDecibels(Level);
        double[] ratios = [.. usable.Select(b => ToDecibels(b.Level[index] / b.ExpectedLevel[index]))];
        LevelRatioDecibels = ApertureTrend.Median([.. ratios]);
        foreach (BinEvidence b in usable)
        {
            kept += b.Snapshots[index] * Math.Max(0, b.Coherence[index] - (1 / b.Snapshots[index]));
            expected += b.Snapshots[index] * b.ExpectedCoherence[index];
            snapshots += b.Snapshots[index];
        }

        Snapshots = usable.Length > 0 ? snapshots / usable.Length : 0;
        ExpectedCoherence = snapshots > 0 ? expected / snapshots : 0;
        CoherenceKept = expected > 0 ? kept / expected : 1;
        BinEvidence[] seen = [.. usable.Where(b => b.StandardError[index] < LargestUsefulError)];
        IsVisible = ExpectedCoherence > LeastVisible && seen.Length > 0 && seen.Length >= 0.3 * usable.Length;
        double[] errors = [.. seen.Select(b => Combine(b.StandardError[index], b.PhaseFloor))];
        Phase = new PhaseFit([.. seen.Select(b => b.Frequency)], [.. seen.Select(b => b.Phase[index])], errors);
        (double amplitude, double amplitudeError) = Robust(
            [.. seen.Select(b => Math.Exp(b.LogGain[index]) * Math.Cos(b.Phase[index] - Phase.At(b.Frequency)))],
            [.. seen.Select(b => Math.Exp(b.LogGain[index]) * Combine(b.StandardError[index], b.LogGainFloor))]);
        amplitude = Math.Max(amplitude, 1e-4);
        (GainNepers, GainError) = (Math.Log(amplitude), amplitudeError / amplitude);
        ModelError = seen.Length > 0 ? ApertureTrend.Median([.. seen.Select(b => b.PhaseFloor)]) : 0.2;
        double gain = IsVisible ? DecibelsPerNeper * GainNepers : 0;
        (ExcessDecibels, ExcessError) = Robust(
            [.. ratios.Select(r => r - gain)], [.. usable.Select(b => DecibelsPerNeper / 2 * Combine(1.4 / Math.Sqrt(Math.Max(b.Snapshots[index], 1)), 0.1))]);
        Deviation = Largest(tolerances);
    }

    public int Index { get; }

    /// <summary>Bins that could be used.</summary>
    public int Bins { get; }

    public double Snapshots { get; }

    public double Level { get; }

    public double LevelDecibels { get; }

    /// <summary>Level over what a healthy channel would show here, dB; median over the bins.</summary>
    public double LevelRatioDecibels { get; }

    /// <summary>Mean coherence that a healthy channel would have with its prediction.</summary>
    public double ExpectedCoherence { get; }

    /// <summary>Share of that coherence that it has, about 1 for a healthy one, 0 for one that hears nothing.</summary>
    public double CoherenceKept { get; }

    /// <summary>True when the field shows the channel's response.</summary>
    public bool IsVisible { get; }

    public PhaseFit Phase { get; }

    public double GainNepers { get; }

    public double GainError { get; }

    public double GainDecibels => DecibelsPerNeper * GainNepers;

    public double GainErrorDecibels => DecibelsPerNeper * GainError;

    /// <summary>Power over what the field and usual self-noise explain at this channel's gain, dB.</summary>
    public double ExcessDecibels { get; }

    public double ExcessError { get; }

    /// <summary>How far the model misleads on phases, radians.</summary>
    public double ModelError { get; }

    /// <summary>Largest of the channel's deviations, in units of the tolerance for each.</summary>
    public double Deviation { get; }

    private double Largest(Tolerances tolerances)
    {
        double d = Math.Max(0, ExcessDecibels / tolerances.ExcessDecibels);
        if (Level <= 0) return 100;
        d = Math.Max(d, -LevelRatioDecibels / 12);
        if (!IsVisible) return CoherenceKept < 0.5 && ExpectedCoherence > LeastVisible ? Math.Max(d, 2) : d;
        d = Math.Max(d, Math.Abs(GainDecibels) / tolerances.GainDecibels);
        if (CoherenceKept < 0.6) d = Math.Max(d, (1 - CoherenceKept) / 0.4);
        double degrees = 180 / Math.PI, micro = 1e6;
        double phase = Phase.Law switch
        {
            PhaseLaw.None => 0,
            PhaseLaw.Reversed => 12,
            PhaseLaw.Constant => Math.Abs(Phase.ConstantRadians) * degrees / tolerances.PhaseDegrees,
            PhaseLaw.Delay => Math.Abs(Phase.DelaySeconds) * micro / tolerances.DelayMicroseconds,
            _ => Math.Max(
                Math.Abs(Phase.BothConstant) * degrees / tolerances.PhaseDegrees, Math.Abs(Phase.BothDelay) * micro / tolerances.DelayMicroseconds),
        };
        return Math.Max(d, phase);
    }

    private static double Combine(double a, double b) => Math.Sqrt((a * a) + (b * b));

    private static double ToDecibels(double power) => 10 * Math.Log10(Math.Max(power, 1e-300));

    // Huber's mean with known scales, and its standard error.
    private static (double Value, double Error) Robust(double[] values, double[] errors)
    {
        if (values.Length == 0) return (0, 10);
        double centre = ApertureTrend.Median([.. values]), total = 0;
        for (int pass = 0; pass < 5; pass++)
        {
            double sum = 0;
            total = 0;
            for (int f = 0; f < values.Length; f++)
            {
                double w = 1 / (errors[f] * errors[f]), r = Math.Abs(values[f] - centre);
                if (r > 2 * errors[f]) w *= 2 * errors[f] / r;
                sum += w * values[f];
                total += w;
            }

            centre = sum / total;
        }

        return (centre, 1 / Math.Sqrt(total));
    }
}
