using System.Numerics;
using System.Runtime.CompilerServices;

namespace ArrayWatch.Signals.Kernels;

/// <summary>Forms v_pᴴ M v_q of a Hermitian matrix, as products over the layouts of <see cref="ComplexProduct"/>.</summary>
internal static unsafe class HermitianForms
{
    private const int GramRows = 32;

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
        TileTarget target = new(tile, tile + ComplexProduct.PanelColumns, ComplexProduct.PanelStride, 1, 1, false);
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
                    ComplexProduct.Tile(v.At(q, k), rows, deep, panel, target);
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
    /// <param name="work"><see cref="GramWork"/> values.</param>
    /// <remarks>The columns v_q are copied once to where panels are packed from whole vectors; strips of rows p follow.</remarks>
    public static void Gram(int count, int n, ComplexView v, ComplexView w, double* gram, double* work)
    {
        nint area = (nint)count * n;
        ComplexView u = new(work, work + area, n, 1, false), columns = new(work + (2 * area), work + (3 * area), count, 1, false);
        double* strip = work + (4 * area);
        for (int q = 0; q < count; q++)
        {
            double* re = v.Re + (q * v.RowStride), im = v.Im + (q * v.RowStride);
            for (int i = 0; i < n; i++)
            {
                nint at = ((nint)i * count) + q;
                columns.Re[at] = re[i];
                columns.Im[at] = im[i];
            }
        }

        ComplexProduct.Multiply(count, n, n, v.Conjugated(), w, u, ProductMode.Set);
        for (int p = 0; p < count; p += GramRows)
        {
            int high = Math.Min(GramRows, count - p), wide = p + high;
            ComplexView to = new(strip, strip + (GramRows * count), wide, 1, false);
            ComplexProduct.Multiply(high, wide, n, u.At(p, 0), columns, to, ProductMode.Set);
            for (int r = 0; r < high; r++) SquaredMagnitudes(to.At(r, 0), gram + ((nint)(p + r) * count), p + r + 1);
            for (int q = 0; q < wide; q++)
            {
                double* mirror = gram + ((nint)q * count) + p;
                for (int r = Math.Max(0, q - p + 1); r < high; r++) mirror[r] = gram[((nint)(p + r) * count) + q];
            }
        }
    }

    /// <summary>Values of work space that <see cref="Gram"/> needs.</summary>
    public static int GramWork(int count, int n) => checked((4 * count * n) + (2 * GramRows * count));

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
