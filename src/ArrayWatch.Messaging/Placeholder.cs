namespace ArrayWatch.Messaging;

internal static class Placeholder;
