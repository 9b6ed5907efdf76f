using ArrayWatch.Detection;
using ArrayWatch.Detection.Beams;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;

namespace ArrayWatch.Monitoring.Mapping;

/// <summary>A decision, in the words of the corrections message. Pure.</summary>
internal static class CorrectionMapper
{
    /// <summary>Maps one decision; a channel without a correction is used as it is.</summary>
    public static CorrectionReport Map(
        ArrayDefinition array, Diagnosis diagnosis, IReadOnlyList<double> frequencies, IReadOnlySet<int> outOfService)
    {
        Dictionary<int, ChannelCorrection> byIndex = diagnosis.Corrections.ToDictionary(c => c.Index);
        return new CorrectionReport
        {
            Time = EventTime.FromSeconds(diagnosis.TimeSeconds),
            Array = array.Id,
            Frequencies = frequencies,
            Channels = [.. Enumerable.Range(0, array.Geometry.Count).Select(n => Channel(array, n, byIndex.GetValueOrDefault(n), frequencies.Count, outOfService))],
            Beams = [.. diagnosis.Beams.SelectMany(Beams)],
        };
    }

    /// <summary>
    /// Whether a beamformer that has applied one should hear of the other at once: a channel is taken in or left out,
    /// carries another's data, or a factor has moved by more than three standard errors and 2 %.
    /// </summary>
    public static bool Differ(CorrectionReport before, CorrectionReport after) =>
        before.Frequencies.Count != after.Frequencies.Count
        || before.Channels.Zip(after.Channels).Any(p => Differ(p.First, p.Second));

    private static bool Differ(ChannelCorrectionReport a, ChannelCorrectionReport b)
    {
        if (a.Use != b.Use || a.Carries != b.Carries || a.Gain.Count != b.Gain.Count) return true;
        for (int f = 0; f < a.Gain.Count; f++)
        {
            double moved = Math.Sqrt(Square(a.Gain[f][0] - b.Gain[f][0]) + Square(a.Gain[f][1] - b.Gain[f][1]));
            double size = Math.Sqrt(Square(b.Gain[f][0]) + Square(b.Gain[f][1]));
            double error = double.IsFinite(b.StandardError[f]) ? b.StandardError[f] : 0;
            if (moved > Math.Max(0.02, 3 * error) * Math.Max(1, size)) return true;
        }

        return false;
    }

    private static double Square(double x) => x * x;

    private static ChannelCorrectionReport Channel(
        ArrayDefinition array, int n, ChannelCorrection? c, int bins, IReadOnlySet<int> outOfService)
    {
        string label = array.Geometry.Channels[n].Label;
        bool use = !outOfService.Contains(n);
        return c is null
            ? new(n, label, use, n, [.. Enumerable.Range(0, bins).Select(_ => Pair(1, 0))], new double[bins])
            : new(n, label, c.Use && use, c.Carries, [.. c.GainReal.Zip(c.GainImaginary, Pair)], c.StandardError);
    }

    private static double[] Pair(double re, double im) => [re, im];

    private static IEnumerable<BeamReport> Beams(BeamAssessment b) =>
        [Beam(b.Look, "conventional", b.Conventional), Beam(b.Look, "adaptive", b.Adaptive)];

    private static BeamReport Beam(LookDirection look, string beamformer, BeamGains g) =>
        new(look.Name, look.AzimuthDegrees, look.ElevationDegrees, beamformer, g.HealthyDecibels, g.FoundDecibels, g.CorrectedDecibels);
}
