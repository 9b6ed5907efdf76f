using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField;

/// <summary>
/// Grids of directions that suit an array: a line tells directions by one cosine, a plane by two (the two
/// sides look alike), a volume by all three.
/// </summary>
public static class DirectionGrid
{
    // Four points to a beamwidth λ/L and more: measured to bring a weighted fit to its bound.
    private const double PointsPerBeam = 4;

    // Denser grids than this are refined around what coarser bins found instead.
    private const int MostPoints = 260;

    /// <summary>Directions for one bin.</summary>
    /// <param name="context">The array, the bin, and hints from coarser bins.</param>
    /// <returns>Unit vectors, and their spacing in direction cosine.</returns>
    public static (IReadOnlyList<Position> Directions, double Spacing) For(FieldContext context)
    {
        ArgumentNullException.ThrowIfNull(context);
        double wavelength = context.SoundSpeed / context.Frequency;
        double wanted = wavelength / (PointsPerBeam * Math.Max(context.Shape.Extents[0], wavelength / 8));
        return context.Shape.Dimensions switch
        {
            <= 1 => Line(context.Shape, wanted),
            2 => Refined(context, Disc(context.Shape, Math.Max(wanted, SpacingOfDisc(MostPoints))), wanted),
            _ => Refined(context, Sphere(Math.Max(wanted, SpacingOfSphere(MostPoints))), wanted),
        };
    }

    private static (IReadOnlyList<Position>, double) Line(ArrayShape shape, double spacing)
    {
        // Equal steps in angle: as dense in cosine as wanted at broadside, denser toward endfire, where
        // a small error of cosine is a large one of angle.
        int points = Math.Max(33, (int)Math.Ceiling(Math.PI / spacing) + 1);
        Position along = shape.Axes[0], across = shape.Axes[1];
        return ([.. Enumerable.Range(0, points).Select(i =>
        {
            double angle = Math.PI * i / (points - 1);
            return (Math.Cos(angle) * along) + (Math.Sin(angle) * across);
        })], Math.PI / (points - 1));
    }

    private static double SpacingOfDisc(int points) => Math.Sqrt(Math.PI / points);

    private static double SpacingOfSphere(int points) => Math.Sqrt(4 * Math.PI / points);

    private static (List<Position>, double) Disc(ArrayShape shape, double spacing)
    {
        spacing = Math.Min(spacing, 0.35);
        List<Position> points = [InPlane(shape, 0, 0)];
        int rings = (int)Math.Ceiling(1 / spacing);
        for (int r = 1; r <= rings; r++)
        {
            double radius = (double)r / rings;
            int count = Math.Max(6, (int)Math.Ceiling(2 * Math.PI * radius / spacing));
            for (int i = 0; i < count; i++)
            {
                double angle = 2 * Math.PI * (i + (0.5 * (r % 2))) / count;
                points.Add(InPlane(shape, radius * Math.Cos(angle), radius * Math.Sin(angle)));
            }
        }

        return (points, spacing);
    }

    private static Position InPlane(ArrayShape shape, double a, double b) =>
        (a * shape.Axes[0]) + (b * shape.Axes[1]) + (Math.Sqrt(Math.Max(0, 1 - (a * a) - (b * b))) * shape.Axes[2]);

    private static (List<Position>, double) Sphere(double spacing)
    {
        spacing = Math.Min(spacing, 0.5);
        int count = (int)Math.Ceiling(4 * Math.PI / (spacing * spacing));
        double golden = Math.PI * (3 - Math.Sqrt(5));
        List<Position> points = [];
        for (int i = 0; i < count; i++)
        {
            double z = 1 - ((2.0 * i + 1) / count), r = Math.Sqrt(1 - (z * z));
            points.Add(new Position(r * Math.Cos(golden * i), r * Math.Sin(golden * i), z));
        }

        return (points, spacing);
    }

    private static (IReadOnlyList<Position>, double) Refined(FieldContext context, (List<Position> Points, double Spacing) coarse, double wanted)
    {
        if (coarse.Spacing <= 1.01 * wanted || context.Hints.Count == 0) return coarse;
        double reach = Math.Max(wanted, Math.Min(context.HintSpacing, coarse.Spacing));
        int steps = Math.Clamp((int)Math.Ceiling(reach / wanted), 1, 3);
        bool planar = context.Shape.Dimensions == 2;
        foreach (Position hint in context.Hints)
        {
            (Position e1, Position e2) = planar ? (context.Shape.Axes[0], context.Shape.Axes[1]) : Tangents(hint);
            for (int i = -steps; i <= steps; i++)
            {
                for (int j = -steps; j <= steps; j++)
                {
                    Position moved = hint + ((i * reach / steps) * e1) + ((j * reach / steps) * e2);
                    coarse.Points.Add(planar ? OntoDisc(context.Shape, moved) : (1 / moved.Length) * moved);
                }
            }
        }

        return (coarse.Points, reach / steps);
    }

    private static Position OntoDisc(ArrayShape shape, Position p)
    {
        double a = p.Dot(shape.Axes[0]), b = p.Dot(shape.Axes[1]), r = Math.Sqrt((a * a) + (b * b));
        return r <= 1 ? InPlane(shape, a, b) : InPlane(shape, a / r, b / r);
    }

    private static (Position, Position) Tangents(Position normal)
    {
        Position other = Math.Abs(normal.Z) < 0.9 ? new(0, 0, 1) : new(1, 0, 0);
        Position a = Cross(normal, other);
        a = (1 / a.Length) * a;
        return (a, Cross(normal, a));
    }

    private static Position Cross(Position a, Position b) =>
        new((a.Y * b.Z) - (a.Z * b.Y), (a.Z * b.X) - (a.X * b.Z), (a.X * b.Y) - (a.Y * b.X));
}
