namespace ArrayWatch.Simulation.Faults;

/// <summary>Channels that carry each other's data.</summary>
public sealed record SwapFault : Fault
{
    /// <summary>For each of <see cref="Fault.Channels"/>, the index whose data it really carries: a permutation of them.</summary>
    public required IReadOnlyList<int> Carries { get; init; }

    /// <inheritdoc/>
    public override string Kind => "swap";

    /// <summary>Two channels exchanged.</summary>
    public static SwapFault Pair(int a, int b) => new() { Channels = [Math.Min(a, b), Math.Max(a, b)], Carries = [Math.Max(a, b), Math.Min(a, b)] };

    /// <summary>Each channel carries the data of the next of the list, the last those of the first.</summary>
    public static SwapFault Cycle(IReadOnlyList<int> channels)
    {
        ArgumentNullException.ThrowIfNull(channels);
        Dictionary<int, int> carries = [];
        for (int i = 0; i < channels.Count; i++) carries[channels[i]] = channels[(i + 1) % channels.Count];
        int[] ordered = [.. channels.Order()];
        return new() { Channels = ordered, Carries = [.. ordered.Select(c => carries[c])] };
    }

    /// <summary>A run of channels in reverse order, wired from the wrong end; the middle one of an odd run is right.</summary>
    public static SwapFault Reversed(int first, int count)
    {
        int[] wrong = [.. Enumerable.Range(first, count).Where(c => c != (2 * first) + count - 1 - c)];
        return new() { Channels = wrong, Carries = [.. wrong.Select(c => (2 * first) + count - 1 - c)] };
    }

    /// <summary>A run of channels shifted by <paramref name="by"/> places, round its end.</summary>
    public static SwapFault Shifted(int first, int count, int by = 1)
    {
        int[] run = [.. Enumerable.Range(first, count)];
        return new() { Channels = run, Carries = [.. run.Select(c => first + ((c - first + by) % count))] };
    }

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        Span<double> oldRe = stackalloc double[re.Length], oldIm = stackalloc double[im.Length];
        re.CopyTo(oldRe);
        im.CopyTo(oldIm);
        for (int i = 0; i < Channels.Count; i++)
        {
            re[Channels[i]] = oldRe[Carries[i]];
            im[Channels[i]] = oldIm[Carries[i]];
        }
    }
}
