using System.Numerics;
using System.Runtime.InteropServices;

namespace ArrayWatch.Benchmarks;

/// <summary>What the baselines need to weight their snapshots as fast as the kernels do.</summary>
internal static class VectorScale
{
    public static void Multiply(ReadOnlySpan<float> from, float factor, Span<float> to)
    {
        ReadOnlySpan<Vector<float>> source = MemoryMarshal.Cast<float, Vector<float>>(from);
        Span<Vector<float>> target = MemoryMarshal.Cast<float, Vector<float>>(to);
        for (int i = 0; i < source.Length; i++) target[i] = source[i] * factor;
        for (int i = source.Length * Vector<float>.Count; i < from.Length; i++) to[i] = factor * from[i];
    }
}
