namespace ArrayWatch.Signals;

/// <summary>An estimate with its standard error, in the unit that the holder's name states.</summary>
/// <param name="Value">The estimate.</param>
/// <param name="StandardError">One standard deviation of <paramref name="Value"/>'s error, not negative.</param>
public readonly record struct Measured(double Value, double StandardError);
