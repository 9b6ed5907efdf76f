namespace ArrayWatch.Simulation;

internal static class Placeholder;
