using System.Globalization;
using Plotly.Blazor;
using Plotly.Blazor.LayoutLib;
using Plotly.Blazor.Traces;
using Plotly.Blazor.Traces.ScatterLib;
using HeatColorBar = Plotly.Blazor.Traces.HeatMapLib.ColorBar;

namespace ArrayWatch.Web.Charts;

/// <summary>Turns a <see cref="ChartSpec"/> into what the chart component draws. Text and grid colours come from the style sheet.</summary>
internal static class ChartTraces
{
    private const string Measured = "#4a8fc4", Notable = "#d65f1f", Model = "#a87408", Band = "rgba(74,143,196,0.28)", Clear = "rgba(0,0,0,0)";

    private static readonly object[] _cycle = Stops("#efe9dd", "#3f82c8", "#20143c", "#c4623a", "#efe9dd");
    private static readonly object[] _deviation = Stops("#12548f", "#7db3da", "#f1eee6", "#eba163", "#a33d08");

    public static List<ITrace> Traces(ChartSpec spec)
    {
        ArgumentNullException.ThrowIfNull(spec);
        List<ITrace> traces = [];
        if (spec.Heat is { } heat) traces.Add(Heat(heat));
        traces.AddRange(spec.Series.Select(Xy));
        return traces;
    }

    public static Layout Layout(ChartSpec spec)
    {
        ArgumentNullException.ThrowIfNull(spec);
        return new Layout
        {
            Height = spec.Height,
            Margin = new Margin { L = 64, R = 16, T = 12, B = 52 },
            PaperBgColor = Clear,
            PlotBgColor = Clear,
            ShowLegend = spec.Series.Count(static s => s.Style is not (XyStyle.BandTop or XyStyle.BandBottom)) > 1,
            Legend = [new Legend { Orientation = Plotly.Blazor.LayoutLib.LegendLib.OrientationEnum.H, Y = 1.12m }],
            HoverMode = HoverModeEnum.Closest,
            Font = new Font { Size = 13, Family = "system-ui, sans-serif" },
            UiRevision = spec.Description,
            XAxis = [X(spec.X)],
            YAxis = [Y(spec.Y)],
        };
    }

    /// <summary>No link to anybody's server, no logo, and only the buttons that help.</summary>
    public static Config Config() => new()
    {
        Responsive = true,
        DisplayLogo = false,
        ShowSendToCloud = false,
        ShowLink = false,
        ModeBarButtonsToRemove = new[] { "select2d", "lasso2d", "autoScale2d" },
    };

    private static XAxis X(ChartAxis axis)
    {
        XAxis x = new() { NTicks = 12, TickAngle = 0, Title = new() { Text = axis.Title }, ZeroLine = false, AutoMargin = Plotly.Blazor.LayoutLib.XAxisLib.AutoMarginFlag.True };
        if (axis.IsTime) x.Type = Plotly.Blazor.LayoutLib.XAxisLib.TypeEnum.Date;
        if (axis is { Minimum: { } low, Maximum: { } high }) x.Range = [low, high];
        return x;
    }

    private static YAxis Y(ChartAxis axis)
    {
        YAxis y = new() { Title = new() { Text = axis.Title }, ZeroLine = false, AutoMargin = Plotly.Blazor.LayoutLib.YAxisLib.AutoMarginFlag.True };
        if (axis.IsReversed) y.AutoRange = Plotly.Blazor.LayoutLib.YAxisLib.AutoRangeEnum.Reversed;
        if (axis is { Minimum: { } low, Maximum: { } high }) y.Range = [low, high];
        return y;
    }

    private static HeatMap Heat(HeatSeries heat) => new()
    {
        X = [.. heat.Columns.Select(Place)],
        Y = [.. heat.Rows],
        Z = [.. heat.Values.Select(static row => (object)row.Select(Number).ToArray())],
        ZMin = (decimal?)heat.Minimum,
        ZMax = (decimal?)heat.Maximum,
        ColorScale = heat.Colours switch
        {
            HeatColours.Cycle => _cycle,
            HeatColours.Deviation => _deviation,
            _ => "Cividis",
        },
        ColorBar = new HeatColorBar { Thickness = 14, Title = new() { Text = heat.Unit } },
        HoverOnGaps = false,
        HoverTemplate = $"%{{y}}, %{{x}}: %{{z:.3~f}} {heat.Unit}<extra></extra>",
    };

    private static Scatter Xy(XySeries series)
    {
        bool band = series.Style is XyStyle.BandTop or XyStyle.BandBottom;
        Scatter scatter = new()
        {
            Name = series.Name,
            X = [.. series.X.Select(Place)],
            Y = [.. series.Y.Select(Number)],
            Mode = series.Style is XyStyle.Dots or XyStyle.Crosses ? ModeFlag.Markers : ModeFlag.Lines,
            ShowLegend = !band,
            ConnectGaps = false,
        };
        if (band) scatter.HoverInfo = HoverInfoFlag.Skip;
        else scatter.HoverTemplate = series.Texts.Count > 0 ? "%{text}: %{y:.3~f} at %{x:.2~f}<extra></extra>" : "%{y:.4~g}, %{x}<extra></extra>";
        if (series.Texts.Count > 0) scatter.TextArray = [.. series.Texts];
        switch (series.Style)
        {
            case XyStyle.Dots:
                scatter.Marker = new Marker { Size = 5, Color = Measured, Opacity = 0.65m };
                break;
            case XyStyle.Crosses:
                scatter.Marker = new Marker { Size = 8, Color = Notable, Symbol = Plotly.Blazor.Traces.ScatterLib.MarkerLib.SymbolEnum.X };
                break;
            case XyStyle.DashedLine:
                scatter.Line = new Line { Color = Model, Width = 3, Dash = "dash" };
                break;
            case XyStyle.Line:
                scatter.Line = new Line { Color = Measured, Width = 2 };
                break;
            default:
                scatter.Line = new Line { Color = Clear, Width = 0 };
                if (series.Style == XyStyle.BandBottom)
                {
                    scatter.Fill = FillEnum.ToNextY;
                    scatter.FillColor = Band;
                }
                break;
        }
        return scatter;
    }

    private static object Place(object value) => value is DateTimeOffset t
        ? t.UtcDateTime.ToString("yyyy-MM-dd HH:mm:ss.fff", CultureInfo.InvariantCulture)
        : value;

    // JSON has no NaN; the component leaves a gap for null, which its list type does not foresee.
    private static object Number(double value) => double.IsFinite(value) ? value : null!;

    private static object[] Stops(params string[] colours) =>
        [.. colours.Select((colour, i) => (object)new object[] { i / (double)(colours.Length - 1), colour })];
}
