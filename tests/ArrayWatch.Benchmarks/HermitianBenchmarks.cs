using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;
using BenchmarkDotNet.Attributes;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Benchmarks;

/// <summary>Inverse of a Hermitian positive definite matrix, the copy of the input included.</summary>
public unsafe class HermitianBenchmarks
{
    private ComplexMatrix _matrix = new(1, 1);
    private ComplexMatrix _work = new(1, 1);
    private ComplexMatrix _inverse = new(1, 1);
    private Matrix<Complex> _managed = Matrix<Complex>.Build.Dense(1, 1);
    private double[] _interleaved = [];
    private double[] _native = [];

    [ParamsSource(nameof(AllSizes))]
    public int Size { get; set; }

    public static IEnumerable<int> AllSizes => Sizes.Matrices;

    [GlobalSetup]
    public void Setup()
    {
        OpenBlas.Require();
        var random = new Random(20270202);
        int n = Size;
        ComplexMatrix a = new(n, n + 4);
        for (int i = 0; i < a.Re.Length; i++) (a.Re[i], a.Im[i]) = (random.NextDouble() - 0.5, random.NextDouble() - 0.5);
        _matrix = new ComplexMatrix(n, n);
        _work = new ComplexMatrix(n, n);
        _inverse = new ComplexMatrix(n, n);
        Products.MultiplyConjugateTranspose(a, a, _matrix);
        for (int i = 0; i < n; i++) _matrix[i, i] += 1;
        _managed = Matrix<Complex>.Build.Dense(n, n, (i, j) => _matrix[i, j]);
        _interleaved = new double[2 * n * n];
        for (int i = 0; i < n * n; i++) (_interleaved[2 * i], _interleaved[(2 * i) + 1]) = (_matrix.Re[i], _matrix.Im[i]);
        _native = new double[2 * n * n];

        // Row-major upper is column-major lower of the conjugate: the inverse's conjugate, whose real parts agree.
        Lapack();
        ArrayWatch();
        Matrix<Complex> managed = MathNet();
        for (int i = 0; i < n * n; i++)
        {
            int row = i / n, column = i % n;
            if (column < row) continue;
            if (Math.Abs(_native[2 * i] - _inverse.Re[i]) > 1e-9 || (managed[row, column] - _inverse[row, column]).Magnitude > 1e-9)
                throw new InvalidOperationException($"the candidates differ at {row}, {column}");
        }
    }

    /// <summary>zpotrf and zpotri: one triangle of the inverse.</summary>
    [Benchmark(Baseline = true)]
    public void Lapack()
    {
        _interleaved.CopyTo(_native, 0);
        int n = Size, info;
        byte lower = (byte)'L';
        fixed (double* a = _native)
        {
            OpenBlas.Zpotrf(&lower, &n, a, &n, &info);
            OpenBlas.Zpotri(&lower, &n, a, &n, &info);
        }
    }

    [Benchmark]
    public Matrix<Complex> MathNet() => _managed.Inverse();

    /// <summary>Both triangles, the inverse factor and the determinant.</summary>
    [Benchmark]
    public double ArrayWatch()
    {
        _work.CopyFrom(_matrix);
        Hermitian.TryInvert(_work, _inverse, out double logDeterminant);
        return logDeterminant;
    }
}
