using System.Collections.Immutable;

namespace ArrayWatch.Signals;

/// <summary>The channels of an array in the order in which snapshots carry them. Immutable.</summary>
public sealed class ArrayGeometry
{
    /// <summary>Largest number of channels that one array may have.</summary>
    public const int MaximumChannels = 4096;

    /// <summary>Creates the geometry of an array.</summary>
    /// <param name="channels">2 to <see cref="MaximumChannels"/> channels with finite positions and distinct labels.</param>
    /// <exception cref="ArgumentException">Too few or too many channels, a repeated label, or a position that is not finite.</exception>
    public ArrayGeometry(IEnumerable<Channel> channels)
    {
        ArgumentNullException.ThrowIfNull(channels);
        Channels = [.. channels];
        if (Channels.Length is < 2 or > MaximumChannels)
            throw new ArgumentException($"an array has 2 to {MaximumChannels} channels, not {Channels.Length}", nameof(channels));
        HashSet<string> seen = new(StringComparer.Ordinal);
        foreach (Channel c in Channels)
        {
            if (string.IsNullOrWhiteSpace(c.Label)) throw new ArgumentException("a channel has an empty label", nameof(channels));
            if (!seen.Add(c.Label)) throw new ArgumentException($"the label '{c.Label}' stands twice", nameof(channels));
            if (!double.IsFinite(c.Position.Length)) throw new ArgumentException($"the position of '{c.Label}' is not finite", nameof(channels));
        }

        Position sum = default;
        foreach (Channel c in Channels) sum += c.Position;
        Centroid = (1.0 / Channels.Length) * sum;
        double aperture = 0, nearest = double.PositiveInfinity;
        for (int i = 0; i < Channels.Length; i++)
        {
            for (int j = 0; j < i; j++)
            {
                double d = Channels[i].Position.DistanceTo(Channels[j].Position);
                aperture = Math.Max(aperture, d);
                nearest = Math.Min(nearest, d);
            }
        }

        ApertureMetres = aperture;
        SmallestSpacingMetres = nearest;
    }

    /// <summary>The channels, index 0 first.</summary>
    public ImmutableArray<Channel> Channels { get; }

    /// <summary>Number of channels, N.</summary>
    public int Count => Channels.Length;

    /// <summary>Mean position, metres.</summary>
    public Position Centroid { get; }

    /// <summary>Largest distance between two channels, metres.</summary>
    public double ApertureMetres { get; }

    /// <summary>Smallest distance between two channels, metres; 0 where two share a place.</summary>
    public double SmallestSpacingMetres { get; }

    /// <summary>Position of channel <paramref name="index"/>, metres.</summary>
    public Position this[int index] => Channels[index].Position;

    /// <summary>A uniform line of <paramref name="count"/> channels that starts at the origin.</summary>
    /// <param name="count">Number of channels.</param>
    /// <param name="spacingMetres">Distance between neighbours, metres, positive.</param>
    /// <param name="axis">Direction of the line; any non-zero length.</param>
    /// <param name="labelPrefix">Put before each label's number.</param>
    /// <param name="firstLabel">Number of the first label.</param>
    /// <param name="groupSize">Channels to a group, labelled A, B, …; 0 for no groups.</param>
    /// <returns>The geometry.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A count, spacing, axis or group size that makes no line.</exception>
    public static ArrayGeometry UniformLine(
        int count, double spacingMetres, Position axis, string labelPrefix = "", int firstLabel = 1, int groupSize = 0)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 2);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(spacingMetres);
        ArgumentOutOfRangeException.ThrowIfNegative(groupSize);
        if (!(axis.Length > 0)) throw new ArgumentOutOfRangeException(nameof(axis), "the axis of a line needs a length");
        Position unit = (1.0 / axis.Length) * axis;
        return new(Enumerable.Range(0, count).Select(i => new Channel(
            $"{labelPrefix}{firstLabel + i}", (i * spacingMetres) * unit, groupSize > 0 ? $"G{(i / groupSize) + 1}" : null)));
    }
}
