using System.Runtime.CompilerServices;
using System.Text.Json;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.LinearAlgebra;

/// <summary>Results of SciPy (LAPACK), made by tests/reference/linear_algebra.py.</summary>
[Trait("Category", "Kernels")]
public sealed class ScipyReferenceTests
{
    private const double Relative = 1e-11;

    public static TheoryData<int> Cases() => [0, 1, 2, 3];

    [Theory]
    [MemberData(nameof(Cases))]
    public void Inverse_determinant_and_eigenvalues_are_SciPys(int index)
    {
        JsonElement expected = Case(index);
        int n = expected.GetProperty("size").GetInt32();
        ComplexMatrix matrix = Matrix(n), factor = new(n, n), inverse = new(n, n), vectors = new(3, n);
        double[] values = new double[3];
        Hermitian.LargestEigenpairs(matrix, 3, values, vectors);
        Close(Values(expected, "eigenvalues"), values);

        factor.CopyFrom(matrix);
        Assert.True(Hermitian.TryInvert(factor, inverse, out double logDeterminant));
        Close([expected.GetProperty("logDeterminant").GetDouble()], [logDeterminant]);
        Close(Values(expected, "inverseFirstRowRe"), inverse.Re[..n]);
        Close(Values(expected, "inverseFirstRowIm"), inverse.Im[..n]);

        double[] gram = new double[9];
        Products.GramMagnitudes(Rows(n), inverse, gram);
        Close(Values(expected, "gram"), gram);
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Forms_and_real_systems_are_SciPys(int index)
    {
        JsonElement expected = Case(index);
        int n = expected.GetProperty("size").GetInt32();
        ComplexMatrix matrix = Matrix(n);
        double[] forms = new double[3], real = [.. matrix.Re], solution = [.. Enumerable.Range(0, n).Select(i => Math.Cos(i))];
        Products.QuadraticForms(Rows(n), matrix, forms);
        Close(Values(expected, "forms"), forms);

        Assert.True(RealCholesky.TryFactor(real, n));
        RealCholesky.Solve(real, n, solution);
        Close(Values(expected, "realSolution"), solution);
        RealCholesky.Invert(real, n);
        Close(Values(expected, "realInverseDiagonal"), [.. Enumerable.Range(0, n).Select(i => real[(i * n) + i])]);
    }

    private static ComplexMatrix Matrix(int n)
    {
        ComplexMatrix a = new(n, n), matrix = new(n, n);
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++) a[i, j] = new(Math.Sin(1 + (3 * i) + (5 * j)), Math.Cos(2 + (7 * i) - (4 * j)));
        }

        Products.MultiplyConjugateTranspose(a, a, matrix);
        for (int i = 0; i < matrix.Re.Length; i++) (matrix.Re[i], matrix.Im[i]) = (matrix.Re[i] / n, matrix.Im[i] / n);
        for (int i = 0; i < n; i++) matrix[i, i] += 0.5;
        return matrix;
    }

    private static ComplexMatrix Rows(int n)
    {
        var rows = new ComplexMatrix(3, n);
        for (int q = 0; q < 3; q++)
        {
            for (int i = 0; i < n; i++) rows[q, i] = System.Numerics.Complex.FromPolarCoordinates(1, (0.3 + q) * i);
        }

        return rows;
    }

    /// <summary>Relative to the largest value, which is what a backward stable method promises.</summary>
    private static void Close(double[] expected, double[] actual)
    {
        double scale = expected.Max(Math.Abs);
        Assert.Equal(expected.Length, actual.Length);
        for (int i = 0; i < expected.Length; i++) Assert.Equal(expected[i], actual[i], Relative * scale);
    }

    private static double[] Values(JsonElement element, string name) => [.. element.GetProperty(name).EnumerateArray().Select(v => v.GetDouble())];

    private static JsonElement Case(int index, [CallerFilePath] string here = "")
    {
        string path = Path.Combine(Path.GetDirectoryName(here)!, "..", "..", "..", "reference", "linear_algebra.json");
        using JsonDocument document = JsonDocument.Parse(File.ReadAllBytes(path));
        return document.RootElement.GetProperty("cases")[index].Clone();
    }
}
