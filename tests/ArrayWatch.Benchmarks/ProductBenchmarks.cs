using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;
using BenchmarkDotNet.Attributes;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Benchmarks;

/// <summary>Products of n×n complex matrices.</summary>
public unsafe class ProductBenchmarks
{
    private ComplexMatrix _a = new(1, 1);
    private ComplexMatrix _b = new(1, 1);
    private ComplexMatrix _c = new(1, 1);
    private Matrix<Complex> _managed = Matrix<Complex>.Build.Dense(1, 1);
    private double[] _interleaved = [];
    private double[] _product = [];

    [ParamsSource(nameof(AllSizes))]
    public int Size { get; set; }

    public static IEnumerable<int> AllSizes => Sizes.Matrices;

    [GlobalSetup]
    public void Setup()
    {
        OpenBlas.Require();
        var random = new Random(20270203);
        int n = Size;
        _b = Random(random, n, n);
        _a = new ComplexMatrix(n, n);
        _c = new ComplexMatrix(n, n);
        Products.MultiplyConjugateTranspose(_b, _b, _a);
        _managed = Matrix<Complex>.Build.Dense(n, n, (i, j) => _a[i, j]);
        _interleaved = new double[2 * n * n];
        for (int i = 0; i < n * n; i++) (_interleaved[2 * i], _interleaved[(2 * i) + 1]) = (_a.Re[i], _a.Im[i]);
        _product = new double[2 * n * n];

        Zgemm();
        Products.Multiply(_a, _a, _c);
        Matrix<Complex> managed = MathNetMultiply();
        for (int i = 0; i < n * n; i++)
        {
            double scale = 1e-10 * n * n;
            if (Math.Abs(_product[2 * i] - _c.Re[i]) > scale || (managed[i / n, i % n] - _c[i / n, i % n]).Magnitude > scale)
                throw new InvalidOperationException($"the candidates differ at {i / n}, {i % n}");
        }
    }

    [Benchmark(Baseline = true)]
    public void Zgemm()
    {
        double* one = stackalloc double[] { 1, 0 }, zero = stackalloc double[] { 0, 0 };
        fixed (double* a = _interleaved, c = _product)
            OpenBlas.Zgemm(OpenBlas.RowMajor, OpenBlas.NoTranspose, OpenBlas.NoTranspose, Size, Size, Size, one, a, Size, a, Size, zero, c, Size);
    }

    [Benchmark]
    public Matrix<Complex> MathNetMultiply() => _managed.Multiply(_managed);

    [Benchmark]
    public void Multiply() => Products.Multiply(_a, _a, _c);

    [Benchmark]
    public void MultiplyConjugateTranspose() => Products.MultiplyConjugateTranspose(_a, _b, _c);

    [Benchmark]
    public void ConjugateTransposeMultiply() => Products.ConjugateTransposeMultiply(_a, _b, _c);

    private static ComplexMatrix Random(Random random, int rows, int columns)
    {
        var m = new ComplexMatrix(rows, columns);
        for (int i = 0; i < m.Re.Length; i++) (m.Re[i], m.Im[i]) = (random.NextDouble() - 0.5, random.NextDouble() - 0.5);
        return m;
    }
}
