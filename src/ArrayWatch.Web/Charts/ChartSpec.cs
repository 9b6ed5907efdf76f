namespace ArrayWatch.Web.Charts;

/// <summary>One chart: only numbers and texts, no behaviour. A new instance means a new drawing.</summary>
/// <param name="Description">What it shows, for people who do not see it.</param>
/// <param name="Height">Height, pixels.</param>
/// <param name="X">Horizontal axis.</param>
/// <param name="Y">Vertical axis.</param>
/// <param name="Heat">A picture; null for none.</param>
/// <param name="Series">Lines and points, the first at the bottom.</param>
public sealed record ChartSpec(string Description, int Height, ChartAxis X, ChartAxis Y, HeatSeries? Heat, IReadOnlyList<XySeries> Series);

/// <summary>An axis.</summary>
/// <param name="Title">Quantity and unit.</param>
/// <param name="IsTime">True for times.</param>
/// <param name="IsReversed">True when values grow downward.</param>
/// <param name="Minimum">Start of a fixed range; null to follow the data.</param>
/// <param name="Maximum">End of a fixed range; null to follow the data.</param>
public sealed record ChartAxis(string Title, bool IsTime = false, bool IsReversed = false, double? Minimum = null, double? Maximum = null);

/// <summary>A picture of coloured cells.</summary>
/// <param name="Columns">Column names or times.</param>
/// <param name="Rows">Row names.</param>
/// <param name="Values">Row by row; NaN for nothing.</param>
/// <param name="Colours">Which colours.</param>
/// <param name="Minimum">Value of the first colour; null to follow the data.</param>
/// <param name="Maximum">Value of the last colour; null to follow the data.</param>
/// <param name="Unit">Put after each value.</param>
public sealed record HeatSeries(
    IReadOnlyList<object> Columns, IReadOnlyList<string> Rows, double[][] Values, HeatColours Colours, double? Minimum, double? Maximum, string Unit);

/// <summary>Colour sequences, all readable without red-green vision.</summary>
public enum HeatColours
{
    /// <summary>From little to much.</summary>
    Sequence,

    /// <summary>Round: the first and the last colour are one, for angles.</summary>
    Cycle,

    /// <summary>Pale in the middle, for deviations.</summary>
    Deviation,
}

/// <summary>Points, or a line through points.</summary>
/// <param name="Name">In the legend.</param>
/// <param name="X">Numbers or times.</param>
/// <param name="Y">Numbers; NaN for a gap.</param>
/// <param name="Texts">Shown at each point under the pointer; empty for none.</param>
/// <param name="Style">How it looks.</param>
public sealed record XySeries(string Name, IReadOnlyList<object> X, IReadOnlyList<double> Y, IReadOnlyList<string> Texts, XyStyle Style);

/// <summary>How points or lines look: colour and form differ together.</summary>
public enum XyStyle
{
    /// <summary>Measured points.</summary>
    Dots,

    /// <summary>Measured points that matter.</summary>
    Crosses,

    /// <summary>The model.</summary>
    DashedLine,

    /// <summary>A mean over time.</summary>
    Line,

    /// <summary>Upper edge of a band.</summary>
    BandTop,

    /// <summary>Lower edge of a band, filled up to the series before it.</summary>
    BandBottom,
}
