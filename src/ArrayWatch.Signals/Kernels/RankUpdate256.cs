using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>The tiles of <see cref="RankUpdate"/> in 256-bit vectors.</summary>
/// <remarks>
/// Lanes are rows, eight to a vector. Eight rows by six columns are 12 accumulators, two vectors of rows and
/// one broadcast at a time: 15 of 16 registers. The 16 columns of a tile are 6 + 6 + 4; the upper half of a
/// diagonal tile needs its first eight columns only, 6 + 4. Fused throughout.
/// </remarks>
internal static unsafe class RankUpdate256
{
    /// <inheritdoc cref="RankUpdate.Apply"/>
    public static void Apply(float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        for (int p = 0; p < panels; p++)
        {
            float* a = packed + (p * RankUpdate.PackedPanelLength);
            for (int q = 0; q <= p; q++)
            {
                float* s = sum + RankUpdate.TileOffset(p, q), b = packed + (q * RankUpdate.PackedPanelLength);
                Prefetch(s + RankUpdate.TileLength);
                Six(s, a, b, depth, keep, gain);
                if (p == q)
                {
                    Four(s + (6 * RankUpdate.ColumnLength), a, b + 6, depth, keep, gain);
                }
                else
                {
                    Six(s + (6 * RankUpdate.ColumnLength), a, b + 6, depth, keep, gain);
                    Four(s + (12 * RankUpdate.ColumnLength), a, b + 12, depth, keep, gain);
                }

                Six(s + 8, a + 8, b, depth, keep, gain);
                Six(s + 8 + (6 * RankUpdate.ColumnLength), a + 8, b + 6, depth, keep, gain);
                Four(s + 8 + (12 * RankUpdate.ColumnLength), a + 8, b + 12, depth, keep, gain);
            }
        }
    }

    /// <summary>Asks for a tile: with few snapshots the products are too short to hide its arrival.</summary>
    private static void Prefetch(float* tile)
    {
        for (int i = 0; i < RankUpdate.TileLength; i += 16) Sse.Prefetch0(tile + i);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Six(float* s, float* a, float* b, int depth, float keep, float gain)
    {
        Vector256<float> r0 = default, r1 = default, r2 = default, r3 = default, r4 = default, r5 = default;
        Vector256<float> i0 = default, i1 = default, i2 = default, i3 = default, i4 = default, i5 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector256<float> x = Vector256.Load(a), y = Vector256.Load(a + 16), b0 = Vector256.Create(b[0]);
            r0 = Fma.MultiplyAdd(x, b0, r0);
            i0 = Fma.MultiplyAdd(y, b0, i0);
            b0 = Vector256.Create(b[16]);
            r0 = Fma.MultiplyAdd(y, b0, r0);
            i0 = Fma.MultiplyAddNegated(x, b0, i0);
            b0 = Vector256.Create(b[1]);
            r1 = Fma.MultiplyAdd(x, b0, r1);
            i1 = Fma.MultiplyAdd(y, b0, i1);
            b0 = Vector256.Create(b[17]);
            r1 = Fma.MultiplyAdd(y, b0, r1);
            i1 = Fma.MultiplyAddNegated(x, b0, i1);
            b0 = Vector256.Create(b[2]);
            r2 = Fma.MultiplyAdd(x, b0, r2);
            i2 = Fma.MultiplyAdd(y, b0, i2);
            b0 = Vector256.Create(b[18]);
            r2 = Fma.MultiplyAdd(y, b0, r2);
            i2 = Fma.MultiplyAddNegated(x, b0, i2);
            b0 = Vector256.Create(b[3]);
            r3 = Fma.MultiplyAdd(x, b0, r3);
            i3 = Fma.MultiplyAdd(y, b0, i3);
            b0 = Vector256.Create(b[19]);
            r3 = Fma.MultiplyAdd(y, b0, r3);
            i3 = Fma.MultiplyAddNegated(x, b0, i3);
            b0 = Vector256.Create(b[4]);
            r4 = Fma.MultiplyAdd(x, b0, r4);
            i4 = Fma.MultiplyAdd(y, b0, i4);
            b0 = Vector256.Create(b[20]);
            r4 = Fma.MultiplyAdd(y, b0, r4);
            i4 = Fma.MultiplyAddNegated(x, b0, i4);
            b0 = Vector256.Create(b[5]);
            r5 = Fma.MultiplyAdd(x, b0, r5);
            i5 = Fma.MultiplyAdd(y, b0, i5);
            b0 = Vector256.Create(b[21]);
            r5 = Fma.MultiplyAdd(y, b0, r5);
            i5 = Fma.MultiplyAddNegated(x, b0, i5);
            a += RankUpdate.PackedLength;
            b += RankUpdate.PackedLength;
        }

        Vector256<float> kept = Vector256.Create(keep), gained = Vector256.Create(gain);
        Add(s, r0, i0, kept, gained);
        Add(s + RankUpdate.ColumnLength, r1, i1, kept, gained);
        Add(s + (2 * RankUpdate.ColumnLength), r2, i2, kept, gained);
        Add(s + (3 * RankUpdate.ColumnLength), r3, i3, kept, gained);
        Add(s + (4 * RankUpdate.ColumnLength), r4, i4, kept, gained);
        Add(s + (5 * RankUpdate.ColumnLength), r5, i5, kept, gained);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Four(float* s, float* a, float* b, int depth, float keep, float gain)
    {
        Vector256<float> r0 = default, r1 = default, r2 = default, r3 = default;
        Vector256<float> i0 = default, i1 = default, i2 = default, i3 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector256<float> x = Vector256.Load(a), y = Vector256.Load(a + 16), b0 = Vector256.Create(b[0]);
            r0 = Fma.MultiplyAdd(x, b0, r0);
            i0 = Fma.MultiplyAdd(y, b0, i0);
            b0 = Vector256.Create(b[16]);
            r0 = Fma.MultiplyAdd(y, b0, r0);
            i0 = Fma.MultiplyAddNegated(x, b0, i0);
            b0 = Vector256.Create(b[1]);
            r1 = Fma.MultiplyAdd(x, b0, r1);
            i1 = Fma.MultiplyAdd(y, b0, i1);
            b0 = Vector256.Create(b[17]);
            r1 = Fma.MultiplyAdd(y, b0, r1);
            i1 = Fma.MultiplyAddNegated(x, b0, i1);
            b0 = Vector256.Create(b[2]);
            r2 = Fma.MultiplyAdd(x, b0, r2);
            i2 = Fma.MultiplyAdd(y, b0, i2);
            b0 = Vector256.Create(b[18]);
            r2 = Fma.MultiplyAdd(y, b0, r2);
            i2 = Fma.MultiplyAddNegated(x, b0, i2);
            b0 = Vector256.Create(b[3]);
            r3 = Fma.MultiplyAdd(x, b0, r3);
            i3 = Fma.MultiplyAdd(y, b0, i3);
            b0 = Vector256.Create(b[19]);
            r3 = Fma.MultiplyAdd(y, b0, r3);
            i3 = Fma.MultiplyAddNegated(x, b0, i3);
            a += RankUpdate.PackedLength;
            b += RankUpdate.PackedLength;
        }

        Vector256<float> kept = Vector256.Create(keep), gained = Vector256.Create(gain);
        Add(s, r0, i0, kept, gained);
        Add(s + RankUpdate.ColumnLength, r1, i1, kept, gained);
        Add(s + (2 * RankUpdate.ColumnLength), r2, i2, kept, gained);
        Add(s + (3 * RankUpdate.ColumnLength), r3, i3, kept, gained);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Add(float* s, Vector256<float> re, Vector256<float> im, Vector256<float> keep, Vector256<float> gain)
    {
        Fma.MultiplyAdd(keep, Vector256.Load(s), gain * re).Store(s);
        Fma.MultiplyAdd(keep, Vector256.Load(s + 16), gain * im).Store(s + 16);
    }
}
