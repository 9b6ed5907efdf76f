using CsCheck;

namespace ArrayWatch.Tests.Signals.Statistics;

/// <summary>
/// Runs a property over generated values that are the same in every run: the library's own sampling fixes only its first
/// value. A failure names the values; these properties hold for all values, so no false failure is expected.
/// </summary>
internal static class Reproducible
{
    /// <summary>Checks <paramref name="property"/> on <paramref name="count"/> values.</summary>
    public static void Always<T>(this Gen<T> generator, ulong start, int count, Action<T> property)
    {
        PCG source = new(1, start);
        for (int i = 0; i < count; i++)
        {
            T value = generator.Generate(source, null, out _);
            try
            {
                property(value);
            }
            catch (Exception e)
            {
                throw new InvalidOperationException($"value {i}: {value}: {e.Message}", e);
            }
        }
    }

    /// <summary>The same for pairs.</summary>
    public static void Always<T1, T2>(this Gen<(T1 First, T2 Second)> generator, ulong start, int count, Action<T1, T2> property)
        => generator.Always(start, count, v => property(v.First, v.Second));

    /// <summary>The same for triples.</summary>
    public static void Always<T1, T2, T3>(this Gen<(T1 First, T2 Second, T3 Third)> generator, ulong start, int count, Action<T1, T2, T3> property)
        => generator.Always(start, count, v => property(v.First, v.Second, v.Third));
}
