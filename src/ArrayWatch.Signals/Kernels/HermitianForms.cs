using System.Numerics;
using System.Runtime.CompilerServices;

namespace ArrayWatch.Signals.Kernels;

/// <summary>Forms v_pᴴ M v_q of a Hermitian matrix, as products over the layouts of <see cref="ComplexProduct"/>.</summary>
internal static unsafe class HermitianForms
{
    /// <summary>Rows of the Gram matrix that are formed at a time.</summary>
    public const int GramRows = 32;

    /// <summary>b_q ← v_qᴴ M v_q.</summary>
    /// <param name="count">Q.</param>
    /// <param name="n">Size of M.</param>
    /// <param name="v">Q×n.</param>
    /// <param name="m">n×n.</param>
    /// <param name="forms">Q values.</param>
    /// <remarks>
    /// What lies below the diagonal blocks of M counts twice and what lies above is never read: the tile's
    /// rows hold conj(v)ᵀ M̃ with M̃ so weighted, and their products with v add up over the panels. The sign
    /// of the imaginary part is that of <see cref="ComplexProduct"/>: the tile is the conjugate.
    /// </remarks>
    [SkipLocalsInit]
    public static void Evaluate(int count, int n, ComplexView v, ComplexView m, double* forms)
    {
        double* panel = stackalloc double[(ComplexProduct.DepthBlock * ComplexProduct.PanelStride) + 8];
        panel = (double*)(((nint)panel + 63) & ~63);
        double* tile = stackalloc double[ComplexProduct.TileRows * ComplexProduct.PanelStride];
        new Span<double>(forms, count).Clear();
        for (int j = 0; j < n; j += ComplexProduct.PanelColumns)
        {
            int wide = Math.Min(ComplexProduct.PanelColumns, n - j);
            for (int k = j; k < n; k += ComplexProduct.DepthBlock)
            {
                int deep = Math.Min(ComplexProduct.DepthBlock, n - k), own = k == j ? wide : 0;
                ComplexProduct.Pack(m.At(k, j), own, wide, true, 1, panel);
                ComplexProduct.Pack(m.At(k + own, j), deep - own, wide, true, 2, panel + (own * ComplexProduct.PanelStride));
                for (int q = 0; q < count; q += ComplexProduct.TileRows)
                {
                    int rows = Math.Min(ComplexProduct.TileRows, count - q);
                    ComplexProduct.Tile(v.At(q, k), rows, deep, panel, tile);
                    for (int r = 0; r < rows; r++) forms[q + r] += Dot(tile + (r * ComplexProduct.PanelStride), v.At(q + r, j), wide);
                }
            }
        }
    }

    /// <summary>g_pq ← |v_pᴴ W v_q|².</summary>
    /// <param name="count">Q.</param>
    /// <param name="n">Size of W.</param>
    /// <param name="v">Q×n.</param>
    /// <param name="w">n×n.</param>
    /// <param name="gram">Q×Q.</param>
    /// <param name="work">2·(Q·n + 32·Q) values.</param>
    public static void Gram(int count, int n, ComplexView v, ComplexView w, double* gram, double* work)
    {
        nint area = (nint)count * n;
        ComplexView u = new(work, work + area, n, 1, false);
        ComplexProduct.Multiply(count, n, n, v.Conjugated(), w, u, ProductMode.Set);
        double* strip = work + (2 * area);
        for (int p = 0; p < count; p += GramRows)
        {
            int high = Math.Min(GramRows, count - p), wide = p + high;
            ComplexView to = new(strip, strip + (GramRows * wide), wide, 1, false);
            ComplexProduct.Multiply(high, wide, n, u.At(p, 0), v.Transposed(), to, ProductMode.Set);
            for (int r = 0; r < high; r++)
            {
                double* row = gram + ((nint)(p + r) * count);
                SquaredMagnitudes(to.At(r, 0), row, p + r + 1);
                for (int q = 0; q < p + r; q++) gram[((nint)q * count) + p + r] = row[q];
            }
        }
    }

    private static double Dot(double* tile, ComplexView v, int wide)
    {
        Vector<double> sum = default;
        int j = 0;
        for (; j <= wide - Vector<double>.Count; j += Vector<double>.Count)
        {
            sum = Vector.MultiplyAddEstimate(Vector.Load(tile + j), Vector.Load(v.Re + j), sum);
            sum = Vector.MultiplyAddEstimate(Vector.Load(tile + ComplexProduct.PanelColumns + j), Vector.Load(v.Im + j), sum);
        }

        double total = Vector.Sum(sum);
        for (; j < wide; j++) total += (tile[j] * v.Re[j]) + (tile[ComplexProduct.PanelColumns + j] * v.Im[j]);
        return total;
    }

    private static void SquaredMagnitudes(ComplexView from, double* to, int count)
    {
        int j = 0;
        for (; j <= count - Vector<double>.Count; j += Vector<double>.Count)
        {
            Vector<double> re = Vector.Load(from.Re + j), im = Vector.Load(from.Im + j);
            Vector.MultiplyAddEstimate(im, im, re * re).Store(to + j);
        }

        for (; j < count; j++) to[j] = (from.Re[j] * from.Re[j]) + (from.Im[j] * from.Im[j]);
    }
}
