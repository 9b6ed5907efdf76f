using System.Numerics;
using System.Runtime.CompilerServices;

namespace ArrayWatch.Signals.Kernels;

/// <summary>The 4×16 tile of a complex product in vectors of whatever width the machine has.</summary>
/// <remarks>
/// Lanes are columns; the 16 columns are done in strips of one vector, so that eight accumulators, two
/// vectors of B and three broadcasts of A fit 16 registers. Same order of summation as
/// <see cref="ComplexTile512"/>, fused where the machine fuses.
/// </remarks>
internal static unsafe class ComplexTileVector
{
    /// <summary>target ← or += Σ_k a_k panel_k; see <see cref="ComplexProduct"/> for the layouts.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Multiply(double* ar, double* ai, nint row1, nint row2, nint row3, int depth, double* panel, in TileTarget target)
    {
        for (int strip = 0; strip < ComplexProduct.PanelColumns; strip += Vector<double>.Count)
        {
            Vector<double> r0 = default, r1 = default, r2 = default, r3 = default, i0 = default, i1 = default, i2 = default, i3 = default;
            double* b = panel + strip;
            for (int k = 0; k < depth; k++)
            {
                Vector<double> br = Vector.Load(b), bi = Vector.Load(b + ComplexProduct.PanelColumns);
                Vector<double> x = new(ar[k]), y = new(ai[k]), z = new(-ai[k]);
                r0 = Vector.MultiplyAddEstimate(z, bi, Vector.MultiplyAddEstimate(x, br, r0));
                i0 = Vector.MultiplyAddEstimate(y, br, Vector.MultiplyAddEstimate(x, bi, i0));
                x = new(ar[row1 + k]);
                y = new(ai[row1 + k]);
                z = new(-ai[row1 + k]);
                r1 = Vector.MultiplyAddEstimate(z, bi, Vector.MultiplyAddEstimate(x, br, r1));
                i1 = Vector.MultiplyAddEstimate(y, br, Vector.MultiplyAddEstimate(x, bi, i1));
                x = new(ar[row2 + k]);
                y = new(ai[row2 + k]);
                z = new(-ai[row2 + k]);
                r2 = Vector.MultiplyAddEstimate(z, bi, Vector.MultiplyAddEstimate(x, br, r2));
                i2 = Vector.MultiplyAddEstimate(y, br, Vector.MultiplyAddEstimate(x, bi, i2));
                x = new(ar[row3 + k]);
                y = new(ai[row3 + k]);
                z = new(-ai[row3 + k]);
                r3 = Vector.MultiplyAddEstimate(z, bi, Vector.MultiplyAddEstimate(x, br, r3));
                i3 = Vector.MultiplyAddEstimate(y, br, Vector.MultiplyAddEstimate(x, bi, i3));
                b += ComplexProduct.PanelStride;
            }

            Vector<double> re = new(target.ReSign), im = new(target.ImSign);
            double* cr = target.Re + strip, ci = target.Im + strip;
            Store(cr, r0 * re, target.Accumulate);
            Store(ci, i0 * im, target.Accumulate);
            Store(cr + target.Stride, r1 * re, target.Accumulate);
            Store(ci + target.Stride, i1 * im, target.Accumulate);
            Store(cr + (2 * target.Stride), r2 * re, target.Accumulate);
            Store(ci + (2 * target.Stride), i2 * im, target.Accumulate);
            Store(cr + (3 * target.Stride), r3 * re, target.Accumulate);
            Store(ci + (3 * target.Stride), i3 * im, target.Accumulate);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Store(double* to, Vector<double> value, bool accumulate) => (accumulate ? value + Vector.Load(to) : value).Store(to);
}
