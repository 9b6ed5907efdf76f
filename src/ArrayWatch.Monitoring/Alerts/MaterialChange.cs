using System.Collections;
using ArrayWatch.Detection;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>Whether a fault's estimate has changed so much that it is worth telling again. Pure.</summary>
internal static class MaterialChange
{
    /// <summary>Share by which a number must change: a fifth.</summary>
    internal const double Share = 0.2;

    private const string StandardErrorSuffix = "StandardError";

    /// <summary>Compares two findings of one fault.</summary>
    public static bool Between(Finding before, Finding after) =>
        !before.Indices.SequenceEqual(after.Indices)
        || before.Group != after.Group
        || !before.Alternatives.SequenceEqual(after.Alternatives)
        || before.Estimate.Count != after.Estimate.Count
        || after.Estimate.Any(e => !e.Key.Contains(StandardErrorSuffix, StringComparison.Ordinal)
            && !(before.Estimate.TryGetValue(e.Key, out object? old) && Alike(old, e.Value)));

    private static bool Alike(object before, object after) => (before, after) switch
    {
        (double a, double b) => Alike(a, b),
        (IReadOnlyList<double> a, IReadOnlyList<double> b) => a.Count == b.Count && Alike(Norm(a), Norm(b)),
        (IDictionary a, IDictionary b) => a.Count == b.Count && a.Keys.Cast<object>().All(k => b.Contains(k) && Equals(a[k], b[k])),
        _ => Equals(before, after),
    };

    private static bool Alike(double a, double b) =>
        !(Math.Abs(a - b) > Share * Math.Max(Math.Abs(a), Math.Abs(b))) && double.IsNaN(a) == double.IsNaN(b);

    private static double Norm(IReadOnlyList<double> values) => Math.Sqrt(values.Where(double.IsFinite).Sum(v => v * v));
}
