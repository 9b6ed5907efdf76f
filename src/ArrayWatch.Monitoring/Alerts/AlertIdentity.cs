using System.Security.Cryptography;
using System.Text;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>
/// Ids that follow from the array, the fault and the event time of raising alone: a recording played twice gives
/// the same ids, and they sort by the time of raising.
/// </summary>
internal static class AlertIdentity
{
    private const int RandomBytes = 10;

    /// <summary>A ULID whose 80 free bits are a digest of what is raised.</summary>
    public static string Create(string array, string key, DateTimeOffset raised)
    {
        byte[] digest = SHA256.HashData(Encoding.UTF8.GetBytes($"{array}\n{key}\n{raised.UtcTicks}"));
        return Ulid.NewUlid(raised, digest.AsSpan(0, RandomBytes)).ToString();
    }
}
