using ArrayWatch.Detection.Beams;
using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Corrections;

/// <summary>Turns the faults that stand into what a beamformer should apply, and what the channels really deliver.</summary>
internal static class CorrectionBuilder
{
    // A channel of these kinds has nothing worth adding.
    private static readonly HashSet<string> LeftOut = new(StringComparer.Ordinal) { "dead", "excess-noise", "coherent-interference", "intermittent" };

    /// <summary>One correction a channel.</summary>
    public static ChannelCorrection[] Corrections(
        IReadOnlyList<Finding> findings, IReadOnlyList<ChannelSummary> summaries, IReadOnlyList<BinEvidence> bins, IReadOnlySet<int> outOfService)
    {
        ChannelCorrection[] result = new ChannelCorrection[summaries.Count];
        for (int i = 0; i < result.Length; i++)
        {
            Finding[] own = [.. findings.Where(f => f.Indices.Contains(i))];
            // Interference at a bin or two leaves the channel's other bins as good as ever.
            bool use = !outOfService.Contains(i) && !own.Any(f => LeftOut.Contains(f.Kind) && f.Kind != "coherent-interference");
            (double gain, double constant, double delay) = Response(own);
            double[] re = new double[bins.Count], im = new double[bins.Count], error = new double[bins.Count];
            for (int f = 0; f < bins.Count; f++)
            {
                (double s, double c) = Math.SinCos(-(constant - (2 * Math.PI * bins[f].Frequency * delay)));
                (re[f], im[f]) = (c / gain, s / gain);
                error[f] = Error(own, summaries[i], bins[f], i);
            }

            result[i] = new ChannelCorrection(i, use, Carries(own, i), re, im, error);
        }

        return result;
    }

    /// <summary>What each channel really delivers, for the array gain as found.</summary>
    public static ChannelResponse[] Delivered(IReadOnlyList<Finding> findings, IReadOnlyList<ChannelSummary> summaries, IReadOnlyList<BinEvidence> bins)
    {
        ChannelResponse[] result = new ChannelResponse[summaries.Count];
        for (int i = 0; i < result.Length; i++)
        {
            Finding[] own = [.. findings.Where(f => f.Indices.Contains(i))];
            if (own.Any(f => f.Kind == "dead"))
            {
                result[i] = ChannelResponse.Dead(i, [.. bins.Select(b => b.Level[i])]);
                continue;
            }

            (double gain, double constant, double delay) = Response(own);
            bool noisy = own.Any(f => f.Kind == "excess-noise");
            double[] re = new double[bins.Count], im = new double[bins.Count], noise = new double[bins.Count];
            for (int f = 0; f < bins.Count; f++)
            {
                (double s, double c) = Math.SinCos(constant - (2 * Math.PI * bins[f].Frequency * delay));
                (re[f], im[f]) = (gain * c, gain * s);
                if (noisy) noise[f] = Math.Max(0, bins[f].Level[i] - (gain * gain * bins[f].ExpectedLevel[i]));
                noise[f] += Foreign(own, bins[f], i);
            }

            result[i] = new ChannelResponse(Carries(own, i), re, im, noise);
        }

        return result;
    }

    private static double Foreign(Finding[] own, BinEvidence bin, int channel) =>
        bin.Foreign is { } pattern && own.Any(f => f.Kind == "coherent-interference") ? pattern.Power[channel] : 0;

    private static int Carries(Finding[] own, int index)
    {
        foreach (Finding f in own)
        {
            if (f.Estimate.TryGetValue("mapping", out object? value) && value is IReadOnlyDictionary<int, int> mapping && mapping.TryGetValue(index, out int carried))
                return carried;
        }

        return index;
    }

    private static (double Gain, double Constant, double Delay) Response(Finding[] own)
    {
        double gain = 1, constant = 0, delay = 0;
        foreach (Finding f in own)
        {
            if (f.Kind == "polarity") constant += Math.PI;
            if (f.Estimate.TryGetValue("gainDecibels", out object? g) && g is double decibels) gain = Math.Pow(10, decibels / 20);
            if (f.Estimate.TryGetValue("phaseDegrees", out object? p) && p is double degrees) constant += degrees * Math.PI / 180;
            if (f.Estimate.TryGetValue("delayMicroseconds", out object? d) && d is double micro) delay += 1e-6 * micro;
        }

        return (gain, constant, delay);
    }

    private static double Error(Finding[] own, ChannelSummary s, BinEvidence bin, int channel)
    {
        if (!s.IsVisible) return bin.StandardError[channel];
        if (own.Any(f => f.Kind == "delay")) return Math.Max(s.GainError, 2 * Math.PI * bin.Frequency * s.Phase.DelayError);
        return Math.Max(s.GainError, s.Phase.ConstantError);
    }
}
