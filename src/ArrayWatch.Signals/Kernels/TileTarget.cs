namespace ArrayWatch.Signals.Kernels;

/// <summary>Where a 4×16 tile of a product goes, and how: C ← (C or 0) + sign · tile.</summary>
internal readonly unsafe struct TileTarget(double* re, double* im, nint stride, double reSign, double imSign, bool accumulate)
{
    /// <summary>First real part.</summary>
    public readonly double* Re = re;

    /// <summary>First imaginary part.</summary>
    public readonly double* Im = im;

    /// <summary>Doubles from one row to the next.</summary>
    public readonly nint Stride = stride;

    /// <summary>Factor of the real parts.</summary>
    public readonly double ReSign = reSign;

    /// <summary>Factor of the imaginary parts.</summary>
    public readonly double ImSign = imSign;

    /// <summary>Whether what stands there is kept.</summary>
    public readonly bool Accumulate = accumulate;
}
