namespace ArrayWatch.NoiseField;

internal static class Placeholder;
