namespace ArrayWatch.Storage;

internal static class Placeholder;
