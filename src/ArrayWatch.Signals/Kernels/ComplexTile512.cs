using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>The 4×16 tile of a complex product in 512-bit vectors.</summary>
/// <remarks>
/// Lanes are columns, eight to a vector; 16 accumulators, four vectors of B and two broadcasts of A are
/// 22 of 32 registers. The sum runs over k in ascending order, fused; it differs from an unfused sum by
/// at most a few units in the last place of Σ|a||b|. No static fields: one with an initialiser, read here, would leave a call in the loop and spill every accumulator.
/// </remarks>
internal static unsafe class ComplexTile512
{
    /// <summary>target ← or += Σ_k a_k panel_k; see <see cref="ComplexProduct"/> for the layouts.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Multiply(double* ar, double* ai, nint row1, nint row2, nint row3, int depth, double* panel, in TileTarget target)
    {
        Vector512<double> r00 = default, r01 = default, r10 = default, r11 = default, r20 = default, r21 = default, r30 = default, r31 = default;
        Vector512<double> i00 = default, i01 = default, i10 = default, i11 = default, i20 = default, i21 = default, i30 = default, i31 = default;
        for (int k = 0; k < depth; k++)
        {
            Vector512<double> br0 = Vector512.Load(panel), br1 = Vector512.Load(panel + 8);
            Vector512<double> bi0 = Vector512.Load(panel + 16), bi1 = Vector512.Load(panel + 24);
            Vector512<double> x = Vector512.Create(ar[k]), y = Vector512.Create(ai[k]);
            r00 = Avx512F.FusedMultiplyAddNegated(y, bi0, Avx512F.FusedMultiplyAdd(x, br0, r00));
            r01 = Avx512F.FusedMultiplyAddNegated(y, bi1, Avx512F.FusedMultiplyAdd(x, br1, r01));
            i00 = Avx512F.FusedMultiplyAdd(y, br0, Avx512F.FusedMultiplyAdd(x, bi0, i00));
            i01 = Avx512F.FusedMultiplyAdd(y, br1, Avx512F.FusedMultiplyAdd(x, bi1, i01));
            x = Vector512.Create(ar[row1 + k]);
            y = Vector512.Create(ai[row1 + k]);
            r10 = Avx512F.FusedMultiplyAddNegated(y, bi0, Avx512F.FusedMultiplyAdd(x, br0, r10));
            r11 = Avx512F.FusedMultiplyAddNegated(y, bi1, Avx512F.FusedMultiplyAdd(x, br1, r11));
            i10 = Avx512F.FusedMultiplyAdd(y, br0, Avx512F.FusedMultiplyAdd(x, bi0, i10));
            i11 = Avx512F.FusedMultiplyAdd(y, br1, Avx512F.FusedMultiplyAdd(x, bi1, i11));
            x = Vector512.Create(ar[row2 + k]);
            y = Vector512.Create(ai[row2 + k]);
            r20 = Avx512F.FusedMultiplyAddNegated(y, bi0, Avx512F.FusedMultiplyAdd(x, br0, r20));
            r21 = Avx512F.FusedMultiplyAddNegated(y, bi1, Avx512F.FusedMultiplyAdd(x, br1, r21));
            i20 = Avx512F.FusedMultiplyAdd(y, br0, Avx512F.FusedMultiplyAdd(x, bi0, i20));
            i21 = Avx512F.FusedMultiplyAdd(y, br1, Avx512F.FusedMultiplyAdd(x, bi1, i21));
            x = Vector512.Create(ar[row3 + k]);
            y = Vector512.Create(ai[row3 + k]);
            r30 = Avx512F.FusedMultiplyAddNegated(y, bi0, Avx512F.FusedMultiplyAdd(x, br0, r30));
            r31 = Avx512F.FusedMultiplyAddNegated(y, bi1, Avx512F.FusedMultiplyAdd(x, br1, r31));
            i30 = Avx512F.FusedMultiplyAdd(y, br0, Avx512F.FusedMultiplyAdd(x, bi0, i30));
            i31 = Avx512F.FusedMultiplyAdd(y, br1, Avx512F.FusedMultiplyAdd(x, bi1, i31));
            panel += ComplexProduct.PanelStride;
        }

        Vector512<double> re = Vector512.Create(target.ReSign), im = Vector512.Create(target.ImSign);
        double* cr = target.Re, ci = target.Im;
        Store(cr, r00 * re, r01 * re, target.Accumulate);
        Store(ci, i00 * im, i01 * im, target.Accumulate);
        Store(cr + target.Stride, r10 * re, r11 * re, target.Accumulate);
        Store(ci + target.Stride, i10 * im, i11 * im, target.Accumulate);
        Store(cr + (2 * target.Stride), r20 * re, r21 * re, target.Accumulate);
        Store(ci + (2 * target.Stride), i20 * im, i21 * im, target.Accumulate);
        Store(cr + (3 * target.Stride), r30 * re, r31 * re, target.Accumulate);
        Store(ci + (3 * target.Stride), i30 * im, i31 * im, target.Accumulate);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Store(double* to, Vector512<double> first, Vector512<double> second, bool accumulate)
    {
        if (accumulate)
        {
            first += Vector512.Load(to);
            second += Vector512.Load(to + 8);
        }

        first.Store(to);
        second.Store(to + 8);
    }
}
