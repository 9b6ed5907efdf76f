using System.Runtime.CompilerServices;

namespace ArrayWatch.Signals;

/// <summary>Range checks whose message says what was given and what is allowed. NaN is always refused.</summary>
public static class Check
{
    /// <summary>Answers <paramref name="value"/> when it lies between the two limits, both included.</summary>
    /// <param name="value">The value to check.</param>
    /// <param name="minimum">Smallest allowed value.</param>
    /// <param name="maximum">Largest allowed value.</param>
    /// <param name="what">The quantity with its unit, as the message shall call it.</param>
    /// <param name="parameter">Filled in by the compiler.</param>
    /// <returns><paramref name="value"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The value is outside or NaN.</exception>
    public static double InRange(
        double value, double minimum, double maximum, string what, [CallerArgumentExpression(nameof(value))] string? parameter = null)
        => value >= minimum && value <= maximum
            ? value
            : throw new ArgumentOutOfRangeException(parameter, $"{what} is {value}; {minimum} to {maximum} is allowed");

    /// <summary>Answers <paramref name="value"/> when it is finite and above <paramref name="limit"/>.</summary>
    /// <param name="value">The value to check.</param>
    /// <param name="limit">The value must exceed it.</param>
    /// <param name="what">The quantity with its unit, as the message shall call it.</param>
    /// <param name="parameter">Filled in by the compiler.</param>
    /// <returns><paramref name="value"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The value is not above the limit, infinite or NaN.</exception>
    public static double Above(
        double value, double limit, string what, [CallerArgumentExpression(nameof(value))] string? parameter = null)
        => value > limit && double.IsFinite(value)
            ? value
            : throw new ArgumentOutOfRangeException(parameter, $"{what} is {value}; it must be finite and above {limit}");

    /// <summary>Answers <paramref name="value"/> when it is neither infinite nor NaN.</summary>
    /// <param name="value">The value to check.</param>
    /// <param name="what">The quantity with its unit, as the message shall call it.</param>
    /// <param name="parameter">Filled in by the compiler.</param>
    /// <returns><paramref name="value"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The value is infinite or NaN.</exception>
    public static double Finite(double value, string what, [CallerArgumentExpression(nameof(value))] string? parameter = null)
        => double.IsFinite(value)
            ? value
            : throw new ArgumentOutOfRangeException(parameter, $"{what} is {value}; it must be finite");

    /// <summary>Answers <paramref name="value"/> when it is a probability that is neither 0 nor 1.</summary>
    /// <param name="value">The value to check.</param>
    /// <param name="what">What it is the probability of, as the message shall call it.</param>
    /// <param name="parameter">Filled in by the compiler.</param>
    /// <returns><paramref name="value"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The value is not between 0 and 1, both excluded.</exception>
    public static double OpenProbability(double value, string what, [CallerArgumentExpression(nameof(value))] string? parameter = null)
        => value > 0 && value < 1
            ? value
            : throw new ArgumentOutOfRangeException(parameter, $"{what} is {value}; a probability between 0 and 1, both excluded, is allowed");
}
