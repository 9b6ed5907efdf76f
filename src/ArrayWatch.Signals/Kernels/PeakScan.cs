using System.Numerics;
using System.Runtime.InteropServices;

namespace ArrayWatch.Signals.Kernels;

/// <summary>Largest magnitude of a run of values, and whether all are finite, in one pass.</summary>
/// <remarks>
/// The bits of a float without its sign order as its magnitude does, infinities above every finite value and
/// NaN above those: one integer maximum answers both. Exact at every vector width.
/// </remarks>
internal static class PeakScan
{
    private const uint Magnitude = 0x7FFF_FFFF;
    private const uint Infinity = 0x7F80_0000;

    /// <summary>The largest |value|, or NaN when a value is not finite; 0 for none.</summary>
    public static float Peak(ReadOnlySpan<float> values)
    {
        ReadOnlySpan<uint> bits = MemoryMarshal.Cast<float, uint>(values);
        ReadOnlySpan<Vector<uint>> vectors = MemoryMarshal.Cast<uint, Vector<uint>>(bits);
        Vector<uint> mask = new(Magnitude), m0 = default, m1 = default, m2 = default, m3 = default;
        int i = 0;
        for (; i <= vectors.Length - 4; i += 4)
        {
            m0 = Vector.Max(m0, vectors[i] & mask);
            m1 = Vector.Max(m1, vectors[i + 1] & mask);
            m2 = Vector.Max(m2, vectors[i + 2] & mask);
            m3 = Vector.Max(m3, vectors[i + 3] & mask);
        }

        for (; i < vectors.Length; i++) m0 = Vector.Max(m0, vectors[i] & mask);
        m0 = Vector.Max(Vector.Max(m0, m1), Vector.Max(m2, m3));
        uint most = 0;
        for (int lane = 0; lane < Vector<uint>.Count; lane++) most = Math.Max(most, m0[lane]);
        foreach (uint b in bits[(vectors.Length * Vector<uint>.Count)..]) most = Math.Max(most, b & Magnitude);
        return most < Infinity ? BitConverter.UInt32BitsToSingle(most) : float.NaN;
    }
}
