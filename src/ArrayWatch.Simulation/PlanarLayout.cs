using ArrayWatch.Signals;

namespace ArrayWatch.Simulation;

/// <summary>Irregular layouts of microphones on the ground.</summary>
public static class PlanarLayout
{
    private const int Candidates = 40;

    /// <summary>
    /// Sensors spread over a disc so that none stands close to another: each is the farthest from the
    /// earlier ones of forty random candidates.
    /// </summary>
    /// <param name="count">Number of sensors, at least 2.</param>
    /// <param name="radiusMetres">Radius of the disc, metres, positive.</param>
    /// <param name="random">Draws the candidates.</param>
    /// <param name="labelPrefix">Put before each label's number, which starts at 1.</param>
    /// <param name="groupSize">Sensors to a group; 0 for no groups.</param>
    /// <exception cref="ArgumentOutOfRangeException">A count or radius that makes no layout.</exception>
    public static ArrayGeometry Irregular(int count, double radiusMetres, RandomNumbers random, string labelPrefix = "M", int groupSize = 0)
    {
        ArgumentNullException.ThrowIfNull(random);
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 2);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(radiusMetres);
        List<Position> placed = [];
        while (placed.Count < count)
        {
            Position best = default;
            double farthest = -1;
            for (int i = 0; i < Candidates; i++)
            {
                double r = radiusMetres * Math.Sqrt(random.NextDouble()), a = random.Between(-Math.PI, Math.PI);
                Position p = new(r * Math.Cos(a), r * Math.Sin(a), 0);
                double nearest = placed.Count == 0 ? 0 : placed.Min(q => q.DistanceTo(p));
                if (nearest > farthest) (best, farthest) = (p, nearest);
            }

            placed.Add(best);
        }

        return new(placed.Select((p, i) => new Channel($"{labelPrefix}{i + 1:00}", p, groupSize > 0 ? $"G{(i / groupSize) + 1}" : null)));
    }
}
