namespace ArrayWatch.Simulation;

/// <summary>
/// A reproducible sequence of random numbers: xoshiro256** (D. Blackman, S. Vigna, "Scrambled linear
/// pseudorandom number generators", ACM TOMS 47, 2021), filled by SplitMix64 from a start value. The
/// same start value gives the same numbers on every machine. Not for secrets; one caller at a time.
/// </summary>
public sealed class RandomNumbers
{
    private ulong _a;
    private ulong _b;
    private ulong _c;
    private ulong _d;

    /// <summary>Starts the sequence.</summary>
    /// <param name="startValue">Any value; equal values give equal sequences.</param>
    public RandomNumbers(ulong startValue)
    {
        StartValue = startValue;
        ulong state = startValue;
        _a = Mix(ref state);
        _b = Mix(ref state);
        _c = Mix(ref state);
        _d = Mix(ref state);
    }

    /// <summary>The value that this sequence was started with.</summary>
    public ulong StartValue { get; }

    /// <summary>A sequence of its own for each <paramref name="label"/>, whatever this one has given so far.</summary>
    public RandomNumbers Fork(long label)
    {
        ulong state = StartValue ^ (0xD1B54A32D192ED03UL * (unchecked((ulong)label) + 1));
        return new RandomNumbers(Mix(ref state));
    }

    /// <summary>64 uniform bits.</summary>
    public ulong NextBits()
    {
        ulong result = ulong.RotateLeft(_b * 5, 7) * 9;
        ulong t = _b << 17;
        _c ^= _a;
        _d ^= _b;
        _b ^= _c;
        _a ^= _d;
        _c ^= t;
        _d = ulong.RotateLeft(_d, 45);
        return result;
    }

    /// <summary>Uniform in 0 ≤ u &lt; 1.</summary>
    public double NextDouble() => (NextBits() >> 11) * (1.0 / (1UL << 53));

    /// <summary>Uniform in <paramref name="low"/> ≤ u &lt; <paramref name="high"/>.</summary>
    public double Between(double low, double high) => low + ((high - low) * NextDouble());

    /// <summary>Uniform over the integers <paramref name="low"/> … <paramref name="high"/>, both included.</summary>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="high"/> is below <paramref name="low"/>.</exception>
    public int Integer(int low, int high)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(high, low);
        return low + (int)Math.Min(high - low, Math.Floor(NextDouble() * ((double)high - low + 1)));
    }

    /// <summary>+1 or −1, evenly.</summary>
    public int Sign() => (NextBits() >> 63) == 0 ? 1 : -1;

    /// <summary>Real Gaussian, mean 0, variance 1.</summary>
    public double NextGaussian() => Math.Sqrt(2) * NextComplexGaussian().Re;

    /// <summary>
    /// Circular complex Gaussian with E|z|² = 1, by the polar method (G. Marsaglia, T. A. Bray,
    /// "A convenient method for generating normal variables", SIAM Review 6, 1964).
    /// </summary>
    public (double Re, double Im) NextComplexGaussian()
    {
        while (true)
        {
            double x = (2 * NextDouble()) - 1, y = (2 * NextDouble()) - 1, s = (x * x) + (y * y);
            if (s is <= 0 or >= 1) continue;
            double scale = Math.Sqrt(-Math.Log(s) / s);
            return (scale * x, scale * y);
        }
    }

    /// <summary>Point evenly spread over the unit sphere.</summary>
    public Signals.Position NextDirection() => Signals.Position.Direction(Between(-Math.PI, Math.PI), Math.Asin(Between(-1, 1)));

    /// <summary>Different integers below <paramref name="count"/>, ascending.</summary>
    /// <param name="take">How many, 0 to <paramref name="count"/>.</param>
    /// <param name="count">Number of candidates.</param>
    /// <exception cref="ArgumentOutOfRangeException">More are asked for than there are.</exception>
    public int[] Choose(int take, int count)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(take);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(take, count);
        int[] all = Permutation(count);
        int[] chosen = all[..take];
        Array.Sort(chosen);
        return chosen;
    }

    /// <summary>The integers 0 … <paramref name="count"/>−1 in random order (Fisher–Yates).</summary>
    public int[] Permutation(int count)
    {
        int[] all = [.. Enumerable.Range(0, count)];
        for (int i = count - 1; i > 0; i--)
        {
            int j = Integer(0, i);
            (all[i], all[j]) = (all[j], all[i]);
        }

        return all;
    }

    private static ulong Mix(ref ulong state)
    {
        ulong z = state += 0x9E3779B97F4A7C15UL;
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
        return z ^ (z >> 31);
    }
}
