using System.Data.Common;

namespace ArrayWatch.Web.Live;

/// <summary>Which failures of the store a page survives, and what it then says.</summary>
internal static class StoreTrouble
{
    public const string Sentence = "The store cannot be read just now, so older data are missing here. Live data are not affected; the service's log says why.";

    public static bool Is(Exception exception) => exception is DbException or IOException or TimeoutException or InvalidOperationException or HttpRequestException;
}
