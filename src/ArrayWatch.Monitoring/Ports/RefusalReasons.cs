using System.Text.Json;

namespace ArrayWatch.Monitoring.Ports;

/// <summary>The counters' names as health reports and metrics have them.</summary>
public static class RefusalReasons
{
    private static readonly string[] Names =
        [.. Enum.GetNames<RefusalReason>().Select(JsonNamingPolicy.KebabCaseLower.ConvertName)];

    /// <summary>Number of reasons.</summary>
    public static int Count => Names.Length;

    /// <summary>Name of the counter: "time-backwards".</summary>
    public static string Name(RefusalReason reason) => Names[(int)reason];
}
