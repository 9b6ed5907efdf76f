using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Signals.Kernels;

/// <summary>
/// A rectangular part of a pinned complex matrix in split planes: element (i, j) lies at
/// <c>i·RowStride + j·ColumnStride</c>, and counts as its conjugate when <see cref="Conjugate"/> is set.
/// </summary>
/// <remarks>Unchecked: whoever makes one has checked the shapes and keeps the planes pinned.</remarks>
internal readonly unsafe struct ComplexView(double* re, double* im, nint rowStride, nint columnStride, bool conjugate)
{
    /// <summary>First real part.</summary>
    public readonly double* Re = re;

    /// <summary>First imaginary part.</summary>
    public readonly double* Im = im;

    /// <summary>Elements from one row to the next.</summary>
    public readonly nint RowStride = rowStride;

    /// <summary>Elements from one column to the next.</summary>
    public readonly nint ColumnStride = columnStride;

    /// <summary>Whether the elements are to be conjugated on reading.</summary>
    public readonly bool Conjugate = conjugate;

    /// <summary>All of <paramref name="matrix"/>, whose planes are pinned at the two addresses.</summary>
    public static ComplexView Of(ComplexMatrix matrix, double* re, double* im) => new(re, im, matrix.Columns, 1, false);

    /// <summary>The view whose first element is this view's (row, column).</summary>
    public ComplexView At(nint row, nint column)
    {
        nint offset = (row * RowStride) + (column * ColumnStride);
        return new(Re + offset, Im + offset, RowStride, ColumnStride, Conjugate);
    }

    /// <summary>The transpose.</summary>
    public ComplexView Transposed() => new(Re, Im, ColumnStride, RowStride, Conjugate);

    /// <summary>The conjugate.</summary>
    public ComplexView Conjugated() => new(Re, Im, RowStride, ColumnStride, !Conjugate);
}
