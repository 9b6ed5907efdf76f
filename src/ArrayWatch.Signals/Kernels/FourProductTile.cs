using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>Tile of <see cref="RankUpdate512"/> with four real multiplications to a complex product.</summary>
/// <remarks>16 rows by eight columns: 16 accumulators, two vectors of rows, a broadcast. Fused throughout.</remarks>
internal static unsafe class FourProductTile
{
    /// <summary>Half a tile: 16 rows by eight columns.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Add(float* s, float* a, float* b, int depth, float keep, float gain)
    {
        // A tile ahead: with few snapshots the products are too short to hide the arrival of S.
        for (int i = 0; i < 8 * RankUpdate.ColumnLength; i += 16) Sse.Prefetch0(s + RankUpdate.TileLength + i);
        Vector512<float> r0 = default, i0 = default;
        Vector512<float> r1 = default, i1 = default;
        Vector512<float> r2 = default, i2 = default;
        Vector512<float> r3 = default, i3 = default;
        Vector512<float> r4 = default, i4 = default;
        Vector512<float> r5 = default, i5 = default;
        Vector512<float> r6 = default, i6 = default;
        Vector512<float> r7 = default, i7 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector512<float> x = Vector512.Load(a), y = Vector512.Load(a + 16), z;
            z = Vector512.Create(b[0]);
            r0 = Avx512F.FusedMultiplyAdd(x, z, r0);
            i0 = Avx512F.FusedMultiplyAdd(y, z, i0);
            z = Vector512.Create(b[16]);
            r0 = Avx512F.FusedMultiplyAdd(y, z, r0);
            i0 = Avx512F.FusedMultiplyAddNegated(x, z, i0);
            z = Vector512.Create(b[1]);
            r1 = Avx512F.FusedMultiplyAdd(x, z, r1);
            i1 = Avx512F.FusedMultiplyAdd(y, z, i1);
            z = Vector512.Create(b[17]);
            r1 = Avx512F.FusedMultiplyAdd(y, z, r1);
            i1 = Avx512F.FusedMultiplyAddNegated(x, z, i1);
            z = Vector512.Create(b[2]);
            r2 = Avx512F.FusedMultiplyAdd(x, z, r2);
            i2 = Avx512F.FusedMultiplyAdd(y, z, i2);
            z = Vector512.Create(b[18]);
            r2 = Avx512F.FusedMultiplyAdd(y, z, r2);
            i2 = Avx512F.FusedMultiplyAddNegated(x, z, i2);
            z = Vector512.Create(b[3]);
            r3 = Avx512F.FusedMultiplyAdd(x, z, r3);
            i3 = Avx512F.FusedMultiplyAdd(y, z, i3);
            z = Vector512.Create(b[19]);
            r3 = Avx512F.FusedMultiplyAdd(y, z, r3);
            i3 = Avx512F.FusedMultiplyAddNegated(x, z, i3);
            z = Vector512.Create(b[4]);
            r4 = Avx512F.FusedMultiplyAdd(x, z, r4);
            i4 = Avx512F.FusedMultiplyAdd(y, z, i4);
            z = Vector512.Create(b[20]);
            r4 = Avx512F.FusedMultiplyAdd(y, z, r4);
            i4 = Avx512F.FusedMultiplyAddNegated(x, z, i4);
            z = Vector512.Create(b[5]);
            r5 = Avx512F.FusedMultiplyAdd(x, z, r5);
            i5 = Avx512F.FusedMultiplyAdd(y, z, i5);
            z = Vector512.Create(b[21]);
            r5 = Avx512F.FusedMultiplyAdd(y, z, r5);
            i5 = Avx512F.FusedMultiplyAddNegated(x, z, i5);
            z = Vector512.Create(b[6]);
            r6 = Avx512F.FusedMultiplyAdd(x, z, r6);
            i6 = Avx512F.FusedMultiplyAdd(y, z, i6);
            z = Vector512.Create(b[22]);
            r6 = Avx512F.FusedMultiplyAdd(y, z, r6);
            i6 = Avx512F.FusedMultiplyAddNegated(x, z, i6);
            z = Vector512.Create(b[7]);
            r7 = Avx512F.FusedMultiplyAdd(x, z, r7);
            i7 = Avx512F.FusedMultiplyAdd(y, z, i7);
            z = Vector512.Create(b[23]);
            r7 = Avx512F.FusedMultiplyAdd(y, z, r7);
            i7 = Avx512F.FusedMultiplyAddNegated(x, z, i7);
            a += RankUpdate.PackedLength;
            b += RankUpdate.PackedLength;
        }

        Vector512<float> kept = Vector512.Create(keep), gained = Vector512.Create(gain);
        Store(s, r0, i0, kept, gained);
        Store(s + RankUpdate.ColumnLength, r1, i1, kept, gained);
        Store(s + (2 * RankUpdate.ColumnLength), r2, i2, kept, gained);
        Store(s + (3 * RankUpdate.ColumnLength), r3, i3, kept, gained);
        Store(s + (4 * RankUpdate.ColumnLength), r4, i4, kept, gained);
        Store(s + (5 * RankUpdate.ColumnLength), r5, i5, kept, gained);
        Store(s + (6 * RankUpdate.ColumnLength), r6, i6, kept, gained);
        Store(s + (7 * RankUpdate.ColumnLength), r7, i7, kept, gained);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Store(float* s, Vector512<float> re, Vector512<float> im, Vector512<float> keep, Vector512<float> gain)
    {
        Avx512F.FusedMultiplyAdd(keep, Vector512.Load(s), gain * re).Store(s);
        Avx512F.FusedMultiplyAdd(keep, Vector512.Load(s + 16), gain * im).Store(s + 16);
    }
}
