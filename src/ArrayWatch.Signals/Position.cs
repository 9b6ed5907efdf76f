namespace ArrayWatch.Signals;

/// <summary>A point, or a displacement, in the array's own right-handed frame.</summary>
/// <param name="X">Metres along x.</param>
/// <param name="Y">Metres along y.</param>
/// <param name="Z">Metres along z.</param>
public readonly record struct Position(double X, double Y, double Z)
{
    /// <summary>Euclidean length, metres.</summary>
    public double Length => Math.Sqrt((X * X) + (Y * Y) + (Z * Z));

    /// <summary>Scalar product with <paramref name="other"/>, square metres.</summary>
    public double Dot(Position other) => (X * other.X) + (Y * other.Y) + (Z * other.Z);

    /// <summary>Distance to <paramref name="other"/>, metres.</summary>
    public double DistanceTo(Position other) => (this - other).Length;

    /// <summary>Component-wise sum.</summary>
    public static Position operator +(Position a, Position b) => new(a.X + b.X, a.Y + b.Y, a.Z + b.Z);

    /// <summary>Component-wise difference.</summary>
    public static Position operator -(Position a, Position b) => new(a.X - b.X, a.Y - b.Y, a.Z - b.Z);

    /// <summary>Product with a scalar.</summary>
    public static Position operator *(double s, Position a) => new(s * a.X, s * a.Y, s * a.Z);

    /// <summary>
    /// Unit vector toward <paramref name="azimuthRadians"/> (from x toward y) and
    /// <paramref name="elevationRadians"/> (from the xy-plane toward z).
    /// </summary>
    public static Position Direction(double azimuthRadians, double elevationRadians)
    {
        double c = Math.Cos(elevationRadians);
        return new(c * Math.Cos(azimuthRadians), c * Math.Sin(azimuthRadians), Math.Sin(elevationRadians));
    }
}
