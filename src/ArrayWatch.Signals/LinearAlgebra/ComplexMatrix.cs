namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>
/// A dense complex matrix in double precision, held as two row-major planes so that kernels
/// vectorise. Mutable; not safe for concurrent writing.
/// </summary>
public sealed class ComplexMatrix
{
    /// <summary>Creates a zero matrix.</summary>
    /// <param name="rows">Number of rows, positive.</param>
    /// <param name="columns">Number of columns, positive.</param>
    /// <exception cref="ArgumentOutOfRangeException">A dimension below one.</exception>
    public ComplexMatrix(int rows, int columns)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(rows, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(columns, 1);
        Rows = rows;
        Columns = columns;
        Re = new double[rows * columns];
        Im = new double[rows * columns];
    }

    /// <summary>Number of rows.</summary>
    public int Rows { get; }

    /// <summary>Number of columns.</summary>
    public int Columns { get; }

    /// <summary>Real parts, row-major.</summary>
    public double[] Re { get; }

    /// <summary>Imaginary parts, row-major.</summary>
    public double[] Im { get; }

    /// <summary>Element at <paramref name="row"/>, <paramref name="column"/>.</summary>
    public System.Numerics.Complex this[int row, int column]
    {
        get => new(Re[(row * Columns) + column], Im[(row * Columns) + column]);
        set
        {
            Re[(row * Columns) + column] = value.Real;
            Im[(row * Columns) + column] = value.Imaginary;
        }
    }

    /// <summary>Sets every element to zero.</summary>
    public void Clear()
    {
        Array.Clear(Re);
        Array.Clear(Im);
    }

    /// <summary>Copies all elements of <paramref name="source"/>, which has the same shape.</summary>
    /// <exception cref="ArgumentException">The shapes differ.</exception>
    public void CopyFrom(ComplexMatrix source)
    {
        ArgumentNullException.ThrowIfNull(source);
        if (source.Rows != Rows || source.Columns != Columns)
            throw new ArgumentException($"{source.Rows}×{source.Columns} does not fit {Rows}×{Columns}", nameof(source));
        source.Re.CopyTo(Re, 0);
        source.Im.CopyTo(Im, 0);
    }
}
