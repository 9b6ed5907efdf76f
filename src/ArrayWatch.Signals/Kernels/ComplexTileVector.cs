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
    /// <summary>tile ← Σ_k a_k panel_k; see <see cref="ComplexProduct"/> for the layouts.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Multiply(double* ar, double* ai, nint row1, nint row2, nint row3, int depth, double* panel, double* tile)
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

            double* t = tile + strip;
            r0.Store(t);
            i0.Store(t + 16);
            r1.Store(t + 32);
            i1.Store(t + 48);
            r2.Store(t + 64);
            i2.Store(t + 80);
            r3.Store(t + 96);
            i3.Store(t + 112);
        }
    }
}
