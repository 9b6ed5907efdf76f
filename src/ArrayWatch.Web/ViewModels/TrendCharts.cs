using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Web.Charts;

namespace ArrayWatch.Web.ViewModels;

/// <summary>Charts of how a metric went over time.</summary>
internal static class TrendCharts
{
    /// <summary>Every channel over time.</summary>
    public static ChartSpec Grid(TrendGridView view, TrendMetric metric)
    {
        ArgumentNullException.ThrowIfNull(view);
        int height = Math.Clamp(120 + (view.Labels.Count * 14), 300, 760);
        return new($"{metric.Axis}: every channel over time", height, new("Time, UTC", IsTime: true), new("Channel", IsReversed: true),
            new HeatSeries([.. view.Times.Cast<object>()], view.Labels, view.Rows,
                view.Limit > 0 ? HeatColours.Deviation : HeatColours.Sequence,
                view.Limit > 0 ? -view.Limit : null, view.Limit > 0 ? view.Limit : null, metric.Unit), []);
    }

    /// <summary>One series with its range.</summary>
    /// <returns>Null when there is no value at all.</returns>
    public static ChartSpec? Line(TrendSeries series, TrendMetric metric, string name)
    {
        ArgumentNullException.ThrowIfNull(series);
        if (!series.Mean.Any(double.IsFinite)) return null;
        object[] times = [.. series.Times.Cast<object>()];
        return new($"{metric.Axis} of {name} over time", 340, new("Time, UTC", IsTime: true), new(metric.Axis), null,
        [
            new("largest", times, series.Maximum, [], XyStyle.BandTop),
            new("smallest", times, series.Minimum, [], XyStyle.BandBottom),
            new(name, times, series.Mean, [], XyStyle.Line),
        ]);
    }
}
