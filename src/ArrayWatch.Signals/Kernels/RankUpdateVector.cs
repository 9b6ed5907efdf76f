using System.Numerics;
using System.Runtime.CompilerServices;

namespace ArrayWatch.Signals.Kernels;

/// <summary>The tiles of <see cref="RankUpdate"/> in vectors of whatever width the machine has.</summary>
/// <remarks>
/// Lanes are rows; a strip of one vector by four columns is eight accumulators, two vectors of rows and two
/// broadcasts of columns. Fused where the machine fuses.
/// </remarks>
internal static unsafe class RankUpdateVector
{
    /// <inheritdoc cref="RankUpdate.Apply"/>
    public static void Apply(float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        for (int p = 0; p < panels; p++)
        {
            float* rows = packed + (p * RankUpdate.PackedPanelLength);
            for (int q = 0; q <= p; q++)
            {
                float* tile = sum + RankUpdate.TileOffset(p, q), columns = packed + (q * RankUpdate.PackedPanelLength);
                for (int strip = 0; strip < RankUpdate.PanelChannels; strip += Vector<float>.Count)
                {
                    for (int c = 0; c < RankUpdate.PanelChannels; c += 4)
                        Strip(tile + (c * RankUpdate.ColumnLength) + strip, rows + strip, columns + c, depth, keep, gain);
                }
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Strip(float* s, float* a, float* b, int depth, float keep, float gain)
    {
        Vector<float> r0 = default, r1 = default, r2 = default, r3 = default, i0 = default, i1 = default, i2 = default, i3 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector<float> ar = Vector.Load(a), ai = Vector.Load(a + 16), minus = -ar;
            Vector<float> br = new(b[0]), bi = new(b[16]);
            r0 = Vector.MultiplyAddEstimate(ai, bi, Vector.MultiplyAddEstimate(ar, br, r0));
            i0 = Vector.MultiplyAddEstimate(minus, bi, Vector.MultiplyAddEstimate(ai, br, i0));
            br = new(b[1]);
            bi = new(b[17]);
            r1 = Vector.MultiplyAddEstimate(ai, bi, Vector.MultiplyAddEstimate(ar, br, r1));
            i1 = Vector.MultiplyAddEstimate(minus, bi, Vector.MultiplyAddEstimate(ai, br, i1));
            br = new(b[2]);
            bi = new(b[18]);
            r2 = Vector.MultiplyAddEstimate(ai, bi, Vector.MultiplyAddEstimate(ar, br, r2));
            i2 = Vector.MultiplyAddEstimate(minus, bi, Vector.MultiplyAddEstimate(ai, br, i2));
            br = new(b[3]);
            bi = new(b[19]);
            r3 = Vector.MultiplyAddEstimate(ai, bi, Vector.MultiplyAddEstimate(ar, br, r3));
            i3 = Vector.MultiplyAddEstimate(minus, bi, Vector.MultiplyAddEstimate(ai, br, i3));
            a += RankUpdate.PackedLength;
            b += RankUpdate.PackedLength;
        }

        Add(s, r0, i0, keep, gain);
        Add(s + RankUpdate.ColumnLength, r1, i1, keep, gain);
        Add(s + (2 * RankUpdate.ColumnLength), r2, i2, keep, gain);
        Add(s + (3 * RankUpdate.ColumnLength), r3, i3, keep, gain);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Add(float* s, Vector<float> re, Vector<float> im, float keep, float gain)
    {
        ((Vector.Load(s) * keep) + (re * gain)).Store(s);
        ((Vector.Load(s + 16) * keep) + (im * gain)).Store(s + 16);
    }
}
