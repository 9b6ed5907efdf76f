using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>Tiles of <see cref="RankUpdate512"/> with three real multiplications to a complex product.</summary>
/// <remarks>
/// With A = Σ r r′, B = Σ i i′ and C = Σ (r + i)(r′ − i′), y y′* adds up to Re = A + B and Im = C − A + B. The column's
/// r′ − i′ is packed, the row's r + i is formed on the way. 24 accumulators, six vectors of rows and a
/// broadcast are 31 of 32 registers. The imaginary part loses no more than a few units in the last
/// place of Σ|y||y′|, which is the bound that the plain sum has as well, though not element by element.
/// </remarks>
internal static unsafe class ThreeProductTiles
{
    /// <summary>Two tiles, one below the other: 32 rows by four columns.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddPair(float* upper, float* lower, float* a, float* b, int depth, float keep, float gain)
    {
        Prefetch(upper);
        Prefetch(lower);
        Vector512<float> a0 = default, b0 = default, c0 = default, d0 = default, e0 = default, f0 = default;
        Vector512<float> a1 = default, b1 = default, c1 = default, d1 = default, e1 = default, f1 = default;
        Vector512<float> a2 = default, b2 = default, c2 = default, d2 = default, e2 = default, f2 = default;
        Vector512<float> a3 = default, b3 = default, c3 = default, d3 = default, e3 = default, f3 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector512<float> r0 = Vector512.Load(a), i0 = Vector512.Load(a + 16), s0 = r0 + i0;
            Vector512<float> r1 = Vector512.Load(a + RankUpdate.PackedPanelLength), i1 = Vector512.Load(a + RankUpdate.PackedPanelLength + 16), s1 = r1 + i1;
            Vector512<float> x;
            x = Vector512.Create(b[0]);
            a0 = Avx512F.FusedMultiplyAdd(r0, x, a0);
            d0 = Avx512F.FusedMultiplyAdd(r1, x, d0);
            x = Vector512.Create(b[16]);
            b0 = Avx512F.FusedMultiplyAdd(i0, x, b0);
            e0 = Avx512F.FusedMultiplyAdd(i1, x, e0);
            x = Vector512.Create(b[32]);
            c0 = Avx512F.FusedMultiplyAdd(s0, x, c0);
            f0 = Avx512F.FusedMultiplyAdd(s1, x, f0);
            x = Vector512.Create(b[1]);
            a1 = Avx512F.FusedMultiplyAdd(r0, x, a1);
            d1 = Avx512F.FusedMultiplyAdd(r1, x, d1);
            x = Vector512.Create(b[17]);
            b1 = Avx512F.FusedMultiplyAdd(i0, x, b1);
            e1 = Avx512F.FusedMultiplyAdd(i1, x, e1);
            x = Vector512.Create(b[33]);
            c1 = Avx512F.FusedMultiplyAdd(s0, x, c1);
            f1 = Avx512F.FusedMultiplyAdd(s1, x, f1);
            x = Vector512.Create(b[2]);
            a2 = Avx512F.FusedMultiplyAdd(r0, x, a2);
            d2 = Avx512F.FusedMultiplyAdd(r1, x, d2);
            x = Vector512.Create(b[18]);
            b2 = Avx512F.FusedMultiplyAdd(i0, x, b2);
            e2 = Avx512F.FusedMultiplyAdd(i1, x, e2);
            x = Vector512.Create(b[34]);
            c2 = Avx512F.FusedMultiplyAdd(s0, x, c2);
            f2 = Avx512F.FusedMultiplyAdd(s1, x, f2);
            x = Vector512.Create(b[3]);
            a3 = Avx512F.FusedMultiplyAdd(r0, x, a3);
            d3 = Avx512F.FusedMultiplyAdd(r1, x, d3);
            x = Vector512.Create(b[19]);
            b3 = Avx512F.FusedMultiplyAdd(i0, x, b3);
            e3 = Avx512F.FusedMultiplyAdd(i1, x, e3);
            x = Vector512.Create(b[35]);
            c3 = Avx512F.FusedMultiplyAdd(s0, x, c3);
            f3 = Avx512F.FusedMultiplyAdd(s1, x, f3);
            a += RankUpdate.PackedLength;
            b += RankUpdate.PackedLength;
        }

        Vector512<float> kept = Vector512.Create(keep), gained = Vector512.Create(gain);
        Store(upper, a0, b0, c0, kept, gained);
        Store(upper + RankUpdate.ColumnLength, a1, b1, c1, kept, gained);
        Store(upper + (2 * RankUpdate.ColumnLength), a2, b2, c2, kept, gained);
        Store(upper + (3 * RankUpdate.ColumnLength), a3, b3, c3, kept, gained);
        Store(lower, d0, e0, f0, kept, gained);
        Store(lower + RankUpdate.ColumnLength, d1, e1, f1, kept, gained);
        Store(lower + (2 * RankUpdate.ColumnLength), d2, e2, f2, kept, gained);
        Store(lower + (3 * RankUpdate.ColumnLength), d3, e3, f3, kept, gained);
    }

    /// <summary>Half a tile: 16 rows by eight columns.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddSingle(float* s, float* a, float* b, int depth, float keep, float gain)
    {
        Prefetch(s);
        Prefetch(s + (4 * RankUpdate.ColumnLength));
        Vector512<float> a0 = default, b0 = default, c0 = default;
        Vector512<float> a1 = default, b1 = default, c1 = default;
        Vector512<float> a2 = default, b2 = default, c2 = default;
        Vector512<float> a3 = default, b3 = default, c3 = default;
        Vector512<float> a4 = default, b4 = default, c4 = default;
        Vector512<float> a5 = default, b5 = default, c5 = default;
        Vector512<float> a6 = default, b6 = default, c6 = default;
        Vector512<float> a7 = default, b7 = default, c7 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector512<float> r = Vector512.Load(a), i = Vector512.Load(a + 16), sum = r + i;
            a0 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[0]), a0);
            b0 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[16]), b0);
            c0 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[32]), c0);
            a1 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[1]), a1);
            b1 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[17]), b1);
            c1 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[33]), c1);
            a2 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[2]), a2);
            b2 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[18]), b2);
            c2 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[34]), c2);
            a3 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[3]), a3);
            b3 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[19]), b3);
            c3 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[35]), c3);
            a4 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[4]), a4);
            b4 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[20]), b4);
            c4 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[36]), c4);
            a5 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[5]), a5);
            b5 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[21]), b5);
            c5 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[37]), c5);
            a6 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[6]), a6);
            b6 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[22]), b6);
            c6 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[38]), c6);
            a7 = Avx512F.FusedMultiplyAdd(r, Vector512.Create(b[7]), a7);
            b7 = Avx512F.FusedMultiplyAdd(i, Vector512.Create(b[23]), b7);
            c7 = Avx512F.FusedMultiplyAdd(sum, Vector512.Create(b[39]), c7);
            a += RankUpdate.PackedLength;
            b += RankUpdate.PackedLength;
        }

        Vector512<float> kept = Vector512.Create(keep), gained = Vector512.Create(gain);
        Store(s, a0, b0, c0, kept, gained);
        Store(s + RankUpdate.ColumnLength, a1, b1, c1, kept, gained);
        Store(s + (2 * RankUpdate.ColumnLength), a2, b2, c2, kept, gained);
        Store(s + (3 * RankUpdate.ColumnLength), a3, b3, c3, kept, gained);
        Store(s + (4 * RankUpdate.ColumnLength), a4, b4, c4, kept, gained);
        Store(s + (5 * RankUpdate.ColumnLength), a5, b5, c5, kept, gained);
        Store(s + (6 * RankUpdate.ColumnLength), a6, b6, c6, kept, gained);
        Store(s + (7 * RankUpdate.ColumnLength), a7, b7, c7, kept, gained);
    }

    /// <summary>Asks for four columns of a tile, so that they arrive while the products are formed.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Prefetch(float* s)
    {
        for (int i = 0; i < 4 * RankUpdate.ColumnLength; i += 16) Sse.Prefetch0(s + i);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Store(float* s, Vector512<float> a, Vector512<float> b, Vector512<float> c, Vector512<float> keep, Vector512<float> gain)
    {
        Avx512F.FusedMultiplyAdd(keep, Vector512.Load(s), gain * (a + b)).Store(s);
        Avx512F.FusedMultiplyAdd(keep, Vector512.Load(s + 16), gain * (c - a + b)).Store(s + 16);
    }
}
