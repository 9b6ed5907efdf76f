using System.Globalization;

namespace ArrayWatch.Tests.Signals.Statistics;

/// <summary>Reads tests/reference/physics.csv, which tests/reference/physics.py writes with SciPy.</summary>
internal static class ReferenceValues
{
    /// <summary>The values of one function: arguments and result.</summary>
    public static IReadOnlyList<(double[] Arguments, double Value)> Of(string function)
    {
        List<(double[], double)> values = [];
        foreach (string line in File.ReadLines(Path.Combine(Folder(), "physics.csv")))
        {
            string[] parts = line.Split(',');
            if (parts[0] != function) continue;
            double[] arguments = [.. parts[1].Split(' ').Select(a => double.Parse(a, CultureInfo.InvariantCulture))];
            values.Add((arguments, double.Parse(parts[2], CultureInfo.InvariantCulture)));
        }

        Assert.NotEmpty(values);
        return values;
    }

    /// <summary>Asserts a relative error.</summary>
    public static void Near(double expected, double actual, double relative)
        => Assert.True(
            Math.Abs(actual - expected) <= relative * Math.Abs(expected),
            string.Create(CultureInfo.InvariantCulture, $"expected {expected:R}, got {actual:R}"));

    private static string Folder()
    {
        for (DirectoryInfo? d = new(AppContext.BaseDirectory); d is not null; d = d.Parent)
        {
            string folder = Path.Combine(d.FullName, "tests", "reference");
            if (Directory.Exists(folder)) return folder;
        }

        throw new DirectoryNotFoundException("tests/reference is not above the tests' folder");
    }
}
