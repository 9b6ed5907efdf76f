using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Faults;

/// <summary>All channels of one module fail together, from one cause.</summary>
public sealed record GroupFault : Fault
{
    /// <summary>The module's name in the geometry.</summary>
    public required string Group { get; init; }

    /// <summary>What each of its channels suffers; its own times are not looked at.</summary>
    public required Fault Inner { get; init; }

    /// <inheritdoc/>
    public override string Kind => Inner.Kind;

    /// <summary>A fault of a whole module.</summary>
    /// <param name="geometry">The array.</param>
    /// <param name="group">The module's name.</param>
    /// <param name="inner">What its channels suffer; its channels are replaced by the module's.</param>
    /// <exception cref="ArgumentException">No channel belongs to that module.</exception>
    public static GroupFault Of(ArrayGeometry geometry, string group, Fault inner)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        ArgumentNullException.ThrowIfNull(inner);
        int[] members = [.. Enumerable.Range(0, geometry.Count).Where(i => geometry.Channels[i].Group == group)];
        if (members.Length == 0) throw new ArgumentException($"no channel belongs to the group '{group}'", nameof(group));
        return new() { Channels = members, Group = group, Inner = inner with { Channels = members } };
    }

    /// <inheritdoc/>
    public override void OnSound(FaultMoment moment, Span<double> re, Span<double> im) => Inner.OnSound(moment, re, im);

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im) => Inner.OnSignal(moment, re, im);
}
