namespace ArrayWatch.Web;

internal static class Placeholder;
