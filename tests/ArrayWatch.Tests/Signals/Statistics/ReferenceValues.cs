using System.Globalization;
using System.Runtime.CompilerServices;

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

    private static string Folder([CallerFilePath] string here = "")
        => Path.GetFullPath(Path.Combine(Path.GetDirectoryName(here)!, "..", "..", "..", "reference"));
}
