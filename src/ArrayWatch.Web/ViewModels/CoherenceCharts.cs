using System.Globalization;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Charts;

namespace ArrayWatch.Web.ViewModels;

/// <summary>The five charts of one coherence picture.</summary>
internal sealed record CoherenceCharts(
    ChartSpec? Magnitude, ChartSpec? ModelMagnitude, ChartSpec? Phase, ChartSpec? ModelPhase, ChartSpec Separation, int Block)
{
    private const int Height = 430;

    /// <summary>Makes them.</summary>
    /// <param name="picture">The picture.</param>
    /// <param name="labels">One label a channel.</param>
    /// <param name="isMarked">True for channels whose pairs stand out.</param>
    public static CoherenceCharts Of(CoherencePicture picture, IReadOnlyList<string> labels, Func<int, bool> isMarked)
    {
        ArgumentNullException.ThrowIfNull(picture);
        string at = string.Create(CultureInfo.InvariantCulture, $"at {picture.Frequency:0.##} Hz");
        MatrixPicture? magnitude = MatrixPicture.Of(picture.Magnitude, labels, isPhase: false);
        SeparationView separation = SeparationView.Of(picture, labels, isMarked);
        List<XySeries> series = [Points("Pairs", separation.Pairs, XyStyle.Dots)];
        if (separation.Marked.Count > 0) series.Add(Points("Pairs with a suspect or faulty channel", separation.Marked, XyStyle.Crosses));
        if (separation.Model.Count > 0) series.Add(Points("Model, mean over directions", separation.Model, XyStyle.DashedLine));
        return new(
            Heat(magnitude, $"Measured coherence magnitude {at}", false),
            Heat(MatrixPicture.Of(picture.ModelMagnitude, labels, isPhase: false), $"The model's coherence magnitude {at}", false),
            Heat(MatrixPicture.Of(picture.PhaseDegrees, labels, isPhase: true), $"Measured coherence phase {at}", true),
            Heat(MatrixPicture.Of(picture.ModelPhaseDegrees, labels, isPhase: true), $"The model's coherence phase {at}", true),
            new ChartSpec($"Coherence magnitude against separation {at}", 420,
                new("Separation, m"), new("Coherence magnitude", Minimum: 0, Maximum: 1.02), null, series),
            magnitude?.Block ?? 1);
    }

    private static ChartSpec? Heat(MatrixPicture? picture, string description, bool isPhase) => picture is null ? null : new(
        description, Height, new("Channel"), new("Channel", IsReversed: true),
        isPhase
            ? new HeatSeries([.. picture.Labels], picture.Labels, picture.Rows, HeatColours.Cycle, -180, 180, "°")
            : new HeatSeries([.. picture.Labels], picture.Labels, picture.Rows, HeatColours.Sequence, 0, 1, ""),
        []);

    private static XySeries Points(string name, IReadOnlyList<PairPoint> points, XyStyle style) => new(
        name, [.. points.Select(static p => (object)p.SeparationMetres)], [.. points.Select(static p => p.Magnitude)],
        style == XyStyle.DashedLine ? [] : [.. points.Select(static p => p.Text)], style);
}
