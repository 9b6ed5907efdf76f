using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Signals;

namespace ArrayWatch.Web.ViewModels;

/// <summary>An array drawn to scale in the plane in which it is largest.</summary>
/// <param name="Width">Width of the drawing, in its own units.</param>
/// <param name="Height">Height of the drawing, in its own units.</param>
/// <param name="Marks">One a channel.</param>
/// <param name="Horizontal">Axis that runs to the right: "x", "y" or "z".</param>
/// <param name="Vertical">Axis that runs up.</param>
/// <param name="ScaleMetres">Length of the scale bar, metres.</param>
/// <param name="ScaleUnits">Length of the scale bar in the drawing.</param>
/// <param name="DepthMetres">Extent along the axis that is not drawn, metres.</param>
internal sealed record GeometryView(
    double Width, double Height, IReadOnlyList<GeometryMark> Marks, string Horizontal, string Vertical,
    double ScaleMetres, double ScaleUnits, double DepthMetres)
{
    /// <summary>Width of the drawing's content, and of the margin round it.</summary>
    private const double ContentWidth = 920, Margin = 40, LargestHeight = 420;

    /// <summary>Draws an array.</summary>
    /// <param name="geometry">Where the channels are.</param>
    /// <param name="standings">Each channel's standing; a missing one is drawn as unknown.</param>
    public static GeometryView Of(ArrayGeometry geometry, IReadOnlyList<Standing> standings)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        Axis[] axes = [.. new[] { Along("x", geometry, static p => p.X), Along("y", geometry, static p => p.Y), Along("z", geometry, static p => p.Z) }
            .OrderByDescending(static a => a.Extent)];
        Axis right = axes[0], up = axes[1];

        // Of two axes of one size the earlier name runs to the right, so that a plan has x to the right and y up.
        if (up.Extent > 0.8 * right.Extent && string.CompareOrdinal(up.Name, right.Name) < 0) (right, up) = (up, right);
        double scale = Math.Min(ContentWidth / Math.Max(right.Extent, 1e-9), up.Extent > 0 ? LargestHeight / up.Extent : double.PositiveInfinity);
        double width = right.Extent * scale, height = up.Extent * scale;
        int count = geometry.Count;
        double left = Margin + ((ContentWidth - width) / 2);
        GeometryMark[] marks = new GeometryMark[count];
        double nearest = geometry.SmallestSpacingMetres * scale;
        bool crowded = nearest < 26;
        for (int i = 0; i < count; i++)
        {
            Position p = geometry[i];
            marks[i] = new(i, geometry.Channels[i].Label,
                left + ((right.Of(p) - right.Minimum) * scale),
                Margin + height - ((up.Of(p) - up.Minimum) * scale),
                i < standings.Count ? standings[i] : Standing.Unknown,
                !crowded || i % Math.Max(1, (int)Math.Ceiling(26 / Math.Max(nearest, 1e-6))) == 0 || i == count - 1,
                string.Create(CultureInfo.InvariantCulture, $"x {p.X:0.##} m, y {p.Y:0.##} m, z {p.Z:0.##} m"));
        }
        double bar = RoundLength(right.Extent / 5);
        return new(ContentWidth + (2 * Margin), height + (2 * Margin) + 30, marks, right.Name, up.Name, bar, bar * scale, axes[2].Extent);
    }

    /// <summary>The largest of 1, 2, 5 × a power of ten that is not above <paramref name="length"/>.</summary>
    public static double RoundLength(double length)
    {
        if (!(length > 0)) return 1;
        double power = Math.Pow(10, Math.Floor(Math.Log10(length)));
        return length / power >= 5 ? 5 * power : length / power >= 2 ? 2 * power : power;
    }

    private static Axis Along(string name, ArrayGeometry geometry, Func<Position, double> of) =>
        new(name, of, geometry.Channels.Min(c => of(c.Position)), geometry.Channels.Max(c => of(c.Position)));

    private sealed record Axis(string Name, Func<Position, double> Of, double Minimum, double Maximum)
    {
        public double Extent => Maximum - Minimum;
    }
}

/// <summary>One channel in the drawing.</summary>
/// <param name="Index">0-based index.</param>
/// <param name="Label">What people call it.</param>
/// <param name="X">To the right, drawing units.</param>
/// <param name="Y">Down, drawing units.</param>
/// <param name="Standing">Its standing.</param>
/// <param name="ShowLabel">False where labels would run into each other.</param>
/// <param name="Place">Its coordinates in words.</param>
internal sealed record GeometryMark(int Index, string Label, double X, double Y, Standing Standing, bool ShowLabel, string Place);
