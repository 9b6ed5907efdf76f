using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>
/// Product of complex matrices in double precision, over split planes: C ← A B, −A B or C − A B, with A
/// and B each plain, transposed, conjugated or both.
/// </summary>
/// <remarks>
/// <para>Layout. B is packed into panels of 16 columns and at most 64 rows: <c>[k][16 re | 16 im]</c>,
/// short panels filled up with zeros. A is read in place, four rows at a time, when its elements along k are
/// neighbours, and is packed to that form when they are not. A tile, four rows by 16 columns, is
/// <c>[row][16 re | 16 im]</c>. Rows missing from the last tile repeat the last row and are not stored.</para>
/// <para>conj(A) B is conj(A conj(B)): the sign goes into the packing of B and into the storing of C.</para>
/// <para>Unchecked: callers validate shapes. C must not overlap B; it may be A when B has one panel.</para>
/// </remarks>
internal static unsafe class ComplexProduct
{
    /// <summary>Columns of a panel.</summary>
    public const int PanelColumns = 16;

    /// <summary>Doubles from one k to the next in a panel.</summary>
    public const int PanelStride = 2 * PanelColumns;

    /// <summary>Rows of a tile.</summary>
    public const int TileRows = 4;

    /// <summary>Largest depth of one panel: 16 KiB of B stay in the first-level cache.</summary>
    public const int DepthBlock = 64;

    private const int RowBlock = 32;

    /// <summary>Forms the product of an m×k by a k×n matrix.</summary>
    /// <param name="m">Rows of A and C.</param>
    /// <param name="n">Columns of B and C.</param>
    /// <param name="depth">Columns of A, rows of B.</param>
    /// <param name="a">m×k.</param>
    /// <param name="b">k×n.</param>
    /// <param name="c">m×n, row-major and not conjugated.</param>
    /// <param name="mode">What becomes of C.</param>
    [SkipLocalsInit]
    public static void Multiply(int m, int n, int depth, ComplexView a, ComplexView b, ComplexView c, ProductMode mode)
    {
        double* panel = stackalloc double[(DepthBlock * PanelStride) + 8];
        panel = (double*)(((nint)panel + 63) & ~63);
        bool direct = a.ColumnStride == 1;
        double* rows = stackalloc double[direct ? 1 : 2 * RowBlock * DepthBlock];
        int step = direct ? m : RowBlock;
        for (int k0 = 0; k0 < depth; k0 += DepthBlock)
        {
            int deep = Math.Min(DepthBlock, depth - k0);
            bool accumulate = k0 > 0 || mode == ProductMode.Subtract;
            for (int i0 = 0; i0 < m; i0 += step)
            {
                int high = Math.Min(step, m - i0);
                ComplexView left = a.At(i0, k0);
                if (!direct)
                {
                    PackRows(left, high, deep, rows);
                    left = new ComplexView(rows, rows + (RowBlock * DepthBlock), DepthBlock, 1, false);
                }

                for (int j0 = 0; j0 < n; j0 += PanelColumns)
                {
                    int wide = Math.Min(PanelColumns, n - j0);
                    Pack(b.At(k0, j0), deep, wide, left.Conjugate, 1, panel);
                    Columns(high, wide, deep, left, panel, c.At(i0, j0), accumulate, mode != ProductMode.Set);
                }
            }
        }
    }

    /// <summary>Packs a k×n part of B, n ≤ 16, k ≤ 64, multiplied by <paramref name="factor"/>, into a panel.</summary>
    public static void Pack(ComplexView b, int deep, int wide, bool flip, double factor, double* panel)
    {
        double imaginary = b.Conjugate != flip ? -factor : factor;
        if (b.ColumnStride == 1 && wide == PanelColumns)
        {
            Vector<double> fr = new(factor), fi = new(imaginary);
            for (int k = 0; k < deep; k++)
            {
                double* re = b.Re + (k * b.RowStride), im = b.Im + (k * b.RowStride);
                for (int j = 0; j < PanelColumns; j += Vector<double>.Count)
                {
                    (Vector.Load(re + j) * fr).Store(panel + j);
                    (Vector.Load(im + j) * fi).Store(panel + PanelColumns + j);
                }

                panel += PanelStride;
            }

            return;
        }

        for (int j = 0; j < PanelColumns; j++)
        {
            double* re = b.Re + (j * b.ColumnStride), im = b.Im + (j * b.ColumnStride), to = panel + j;
            for (int k = 0; k < deep; k++)
            {
                bool within = j < wide;
                to[0] = within ? factor * re[k * b.RowStride] : 0;
                to[PanelColumns] = within ? imaginary * im[k * b.RowStride] : 0;
                to += PanelStride;
            }
        }
    }

    /// <summary>Forms one tile: the products of four rows, or of the first <paramref name="high"/> of them, with a panel.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Tile(ComplexView a, int high, int deep, double* panel, in TileTarget target)
    {
        nint row1 = Math.Min(1, high - 1) * a.RowStride;
        nint row2 = Math.Min(2, high - 1) * a.RowStride;
        nint row3 = Math.Min(3, high - 1) * a.RowStride;
        if (Avx512F.IsSupported) ComplexTile512.Multiply(a.Re, a.Im, row1, row2, row3, deep, panel, target);
        else ComplexTileVector.Multiply(a.Re, a.Im, row1, row2, row3, deep, panel, target);
    }

    /// <summary>
    /// Whole tiles go straight into C; those at its edges, and all when C is A (a tile is done in strips that each read A),
    /// by way of a tile beside it.
    /// </summary>
    [SkipLocalsInit]
    private static void Columns(int high, int wide, int deep, ComplexView a, double* panel, ComplexView c, bool accumulate, bool negate)
    {
        double* tile = stackalloc double[TileRows * PanelStride];
        double re = negate ? -1 : 1, im = negate != a.Conjugate ? -1 : 1;
        for (int i = 0; i < high; i += TileRows)
        {
            int rows = Math.Min(TileRows, high - i);
            ComplexView to = c.At(i, 0);
            if (rows == TileRows && wide == PanelColumns && a.Re != c.Re)
            {
                Tile(a.At(i, 0), rows, deep, panel, new TileTarget(to.Re, to.Im, to.RowStride, re, im, accumulate));
                continue;
            }

            Tile(a.At(i, 0), rows, deep, panel, new TileTarget(tile, tile + PanelColumns, PanelStride, re, im, false));
            for (int r = 0; r < rows; r++)
            {
                Store(tile + (r * PanelStride), to.Re + (r * to.RowStride), wide, accumulate);
                Store(tile + (r * PanelStride) + PanelColumns, to.Im + (r * to.RowStride), wide, accumulate);
            }
        }
    }

    private static void Store(double* from, double* to, int wide, bool accumulate)
    {
        int j = 0;
        for (; j <= wide - Vector<double>.Count; j += Vector<double>.Count)
        {
            Vector<double> v = Vector.Load(from + j);
            (accumulate ? v + Vector.Load(to + j) : v).Store(to + j);
        }

        for (; j < wide; j++) to[j] = accumulate ? to[j] + from[j] : from[j];
    }

    private static void PackRows(ComplexView a, int high, int deep, double* rows)
    {
        double sign = a.Conjugate ? -1 : 1;
        for (int k = 0; k < deep; k++)
        {
            double* re = a.Re + (k * a.ColumnStride), im = a.Im + (k * a.ColumnStride), to = rows + k;
            for (int i = 0; i < high; i++)
            {
                to[0] = re[i * a.RowStride];
                to[RowBlock * DepthBlock] = sign * im[i * a.RowStride];
                to += DepthBlock;
            }
        }
    }
}
