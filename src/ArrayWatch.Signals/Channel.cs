namespace ArrayWatch.Signals;

/// <summary>One sensor of an array, as the configuration describes it.</summary>
/// <param name="Label">What people call it; unique in its array, not empty.</param>
/// <param name="Position">Where it is, metres.</param>
/// <param name="Group">The module, connector or digitiser it shares with others; null when it shares none.</param>
public sealed record Channel(string Label, Position Position, string? Group = null);
