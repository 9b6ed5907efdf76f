using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>One line of the array-gain table.</summary>
/// <param name="Look">Look direction with its angles.</param>
/// <param name="Beamformer">"conventional" or "adaptive".</param>
/// <param name="Healthy">With every channel right, dB.</param>
/// <param name="Found">As found, dB.</param>
/// <param name="Corrected">After corrections, dB.</param>
/// <param name="Lost">What the faults cost, dB; never negative.</param>
/// <param name="Regained">What the corrections bring back, dB.</param>
internal sealed record BeamRow(string Look, string Beamformer, string Healthy, string Found, string Corrected, double Lost, double Regained)
{
    /// <summary>Loss above which the table marks the line, dB.</summary>
    public const double NotableDecibels = 1;

    public static IReadOnlyList<BeamRow> Of(IReadOnlyList<BeamReport> beams) =>
    [
        .. beams.Select(static b => new BeamRow(
            $"{b.Name} (azimuth {NumberText.Plain(b.Azimuth, 0)}°, elevation {NumberText.Plain(b.Elevation, 0)}°)", b.Beamformer,
            NumberText.Plain(b.HealthyDecibels, 1), NumberText.Plain(b.FoundDecibels, 1), NumberText.Plain(b.CorrectedDecibels, 1),
            Math.Max(0, b.HealthyDecibels - b.FoundDecibels), b.CorrectedDecibels - b.FoundDecibels)),
    ];
}
