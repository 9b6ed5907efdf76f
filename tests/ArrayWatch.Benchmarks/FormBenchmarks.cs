using ArrayWatch.Signals.LinearAlgebra;
using BenchmarkDotNet.Attributes;

namespace ArrayWatch.Benchmarks;

/// <summary>What a field fit needs at each bin: steered powers and weighted Gram magnitudes of 200 components.</summary>
public class FormBenchmarks
{
    private const int Components = 200;
    private readonly double[] _forms = new double[Components];
    private readonly double[] _gram = new double[Components * Components];
    private ComplexMatrix _rows = new(1, 1);
    private ComplexMatrix _matrix = new(1, 1);

    [ParamsSource(nameof(AllSizes))]
    public int Size { get; set; }

    public static IEnumerable<int> AllSizes => Sizes.Matrices;

    [GlobalSetup]
    public void Setup()
    {
        var random = new Random(20270204);
        _rows = new ComplexMatrix(Components, Size);
        for (int i = 0; i < _rows.Re.Length; i++) (_rows.Re[i], _rows.Im[i]) = (random.NextDouble() - 0.5, random.NextDouble() - 0.5);
        _matrix = new ComplexMatrix(Size, Size);
        Products.ConjugateTransposeMultiply(_rows, _rows, _matrix);
    }

    /// <summary>Each form by its double sum, one element at a time.</summary>
    [Benchmark(Baseline = true)]
    public void QuadraticFormsOneByOne()
    {
        int n = Size;
        for (int q = 0; q < Components; q++)
        {
            double sum = 0;
            for (int i = 0; i < n; i++)
            {
                double re = 0, im = 0;
                for (int j = 0; j < n; j++)
                {
                    double a = _matrix.Re[(i * n) + j], b = _matrix.Im[(i * n) + j], x = _rows.Re[(q * n) + j], y = _rows.Im[(q * n) + j];
                    re += (a * x) - (b * y);
                    im += (a * y) + (b * x);
                }

                sum += (_rows.Re[(q * n) + i] * re) + (_rows.Im[(q * n) + i] * im);
            }

            _forms[q] = sum;
        }
    }

    [Benchmark]
    public void QuadraticForms() => Products.QuadraticForms(_rows, _matrix, _forms);

    [Benchmark]
    public void GramMagnitudes() => Products.GramMagnitudes(_rows, _matrix, _gram);
}
