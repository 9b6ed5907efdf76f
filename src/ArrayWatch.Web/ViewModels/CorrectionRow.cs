using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>What to apply to one channel, in words; channels that need nothing have no row.</summary>
/// <param name="Label">The channel.</param>
/// <param name="Action">What to do.</param>
/// <param name="Factor">Range of the factor over the bins; empty when the channel is left out.</param>
internal sealed record CorrectionRow(string Label, string Action, string Factor)
{
    /// <summary>Smaller corrections than these are not worth a line: dB and degrees.</summary>
    private const double SmallDecibels = 0.5, SmallDegrees = 3;

    public static IReadOnlyList<CorrectionRow> Of(CorrectionReport report)
    {
        ArgumentNullException.ThrowIfNull(report);
        List<CorrectionRow> rows = [];
        foreach (ChannelCorrectionReport c in report.Channels)
        {
            if (!c.Use)
            {
                rows.Add(new(c.Label, "leave it out", ""));
                continue;
            }
            double[] decibels = [.. c.Gain.Select(static g => 10 * Math.Log10((g[0] * g[0]) + (g[1] * g[1]))).Where(double.IsFinite)];
            double[] degrees = [.. c.Gain.Select(static g => Math.Atan2(g[1], g[0]) * 180 / Math.PI).Where(double.IsFinite)];
            bool moved = c.Carries != c.Index;
            bool turned = decibels.Any(static d => Math.Abs(d) > SmallDecibels) || degrees.Any(static d => Math.Abs(d) > SmallDegrees);
            if (!moved && !turned) continue;
            string carried = report.Channels.FirstOrDefault(o => o.Index == c.Carries)?.Label ?? NumberText.General(c.Carries);
            string action = moved ? $"use its data as {carried}" : "multiply by the factor";
            if (moved && turned) action += " and multiply by the factor";
            rows.Add(new(c.Label, action, turned ? $"{Range(decibels)} dB, {Range(degrees)}°" : ""));
        }
        return rows;
    }

    private static string Range(double[] values)
    {
        if (values.Length == 0) return NumberText.CannotTell;
        string low = NumberText.Signed(values.Min(), 1), high = NumberText.Signed(values.Max(), 1);
        return low == high ? low : $"{low} to {high}";
    }
}
