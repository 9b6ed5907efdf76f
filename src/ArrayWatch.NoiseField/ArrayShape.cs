using ArrayWatch.Signals;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Factorization;

namespace ArrayWatch.NoiseField;

/// <summary>Principal axes of an array: whether it is a line, a plane or a volume, and how large. Immutable.</summary>
public sealed class ArrayShape
{
    // An extent below a hundredth of the largest adds nothing that a direction grid could resolve.
    private const double Flat = 0.01;

    /// <summary>Finds the principal axes of <paramref name="geometry"/>.</summary>
    public ArrayShape(ArrayGeometry geometry)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        Matrix<double> scatter = Matrix<double>.Build.Dense(3, 3);
        foreach (Channel c in geometry.Channels)
        {
            Position p = c.Position - geometry.Centroid;
            double[] v = [p.X, p.Y, p.Z];
            for (int i = 0; i < 3; i++)
            {
                for (int j = 0; j < 3; j++) scatter[i, j] += v[i] * v[j];
            }
        }

        Evd<double> evd = scatter.Evd(Symmetricity.Symmetric);
        Axes = [.. Enumerable.Range(0, 3).Select(k => new Position(evd.EigenVectors[0, 2 - k], evd.EigenVectors[1, 2 - k], evd.EigenVectors[2, 2 - k]))];
        Extents = [.. Axes.Select(axis =>
        {
            IEnumerable<double> along = geometry.Channels.Select(c => axis.Dot(c.Position));
            return along.Max() - along.Min();
        })];
        Dimensions = Extents[0] <= 0 ? 0 : 1 + Extents.Skip(1).Count(e => e > Flat * Extents[0]);
    }

    /// <summary>Unit vectors, the axis of largest spread first.</summary>
    public IReadOnlyList<Position> Axes { get; }

    /// <summary>Metres from the first to the last channel along each axis.</summary>
    public IReadOnlyList<double> Extents { get; }

    /// <summary>1 for a line, 2 for a plane, 3 for a volume; 0 when all channels share one place.</summary>
    public int Dimensions { get; }
}
