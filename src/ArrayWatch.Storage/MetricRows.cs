using System.Runtime.InteropServices;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Data.Sqlite;

namespace ArrayWatch.Storage;

/// <summary>Writes metric samples and the roll-ups over them, inside the caller's transaction.</summary>
internal sealed class MetricRows(SqliteConnection connection, IReadOnlyDictionary<string, long> layouts, int retentionDays)
{
    /// <summary>Raw (0), minute, ten minutes, hour; each is computed from the one before.</summary>
    public static readonly int[] Seconds = [0, 60, 600, 3600];

    private readonly Dictionary<string, long> _pruned = [];

    public void Write(string array, DateTimeOffset time, MetricSet metrics)
    {
        long t = time.ToUnixTimeMilliseconds();
        long layout = layouts.GetValueOrDefault(array, -1);
        foreach ((string name, float[] v) in metrics.Channels) Put(array, name, t, layout, v);
        foreach ((string name, double v) in metrics.Field) Put(array, name, t, 0, [(float)v]);
        if (!_pruned.TryGetValue(array, out long last) || t - last >= 3_600_000) Prune(array, t);
    }

    private void Put(string array, string name, long time, long layout, float[] values)
    {
        Upsert(array, name, 0, time, layout, MemoryMarshal.AsBytes<float>(values).ToArray());
        for (int k = 1; k < Seconds.Length; k++) RollUp(array, name, k, time, layout, values.Length);
    }

    /// <summary>A coarse row gives way only to one that stands on at least as much: finer rows may be gone already.</summary>
    private void RollUp(string array, string name, int level, long time, long layout, int channels)
    {
        long width = Seconds[level] * 1000L, start = (long)Math.Floor((double)time / width) * width;
        Summary sum = new(channels);
        using (SqliteCommand k = Schema.Command(connection,
            "SELECT data FROM metric WHERE array=$a AND name=$n AND seconds=$s AND time>=$f AND time<$t AND layout=$l",
            ("$a", array), ("$n", name), ("$s", Seconds[level - 1]), ("$f", start), ("$t", start + width), ("$l", layout)))
        using (SqliteDataReader r = k.ExecuteReader())
        {
            while (r.Read())
            {
                Summary part = Summary.Read(r.GetFieldValue<byte[]>(0), level == 1);
                for (int i = 0; i < Math.Min(channels, part.Channels); i++) sum.Add(part, i, i);
            }
        }

        if (Schema.Scalar(connection, "SELECT data FROM metric WHERE array=$a AND name=$n AND seconds=$s AND time=$t AND layout=$l",
            ("$a", array), ("$n", name), ("$s", Seconds[level]), ("$t", start), ("$l", layout)) is byte[] old
            && Summary.Read(old, false).Samples > sum.Samples) return;
        Upsert(array, name, Seconds[level], start, layout, sum.Write());
    }

    // Steps from name to name along the index: listing distinct names would read the whole array.
    private List<string> Names(string array)
    {
        List<string> names = [];
        while (Schema.Scalar(connection, "SELECT MIN(name) FROM metric WHERE array=$a AND name>$n", ("$a", array), ("$n", names.LastOrDefault(""))) is string next)
            names.Add(next);
        return names;
    }

    private void Upsert(string array, string name, int seconds, long time, long layout, byte[] data) => Schema.Run(
        connection, "INSERT INTO metric VALUES ($a,$n,$s,$t,$l,$d) ON CONFLICT (array, name, seconds, time, layout) DO UPDATE SET data=excluded.data",
        ("$a", array), ("$n", name), ("$s", seconds), ("$t", time), ("$l", layout), ("$d", data));

    /// <summary>Raw for two days, minutes for two weeks, the rest and the pictures for the whole retention.</summary>
    private void Prune(string array, long now)
    {
        _pruned[array] = now;
        for (int k = 0; k < Seconds.Length; k++)
        {
            int days = Math.Min(retentionDays, k switch { 0 => 2, 1 => 14, _ => retentionDays });
            foreach (string name in Names(array))
            {
                Schema.Run(connection, "DELETE FROM metric WHERE array=$a AND name=$n AND seconds=$s AND time<$t",
                    ("$a", array), ("$n", name), ("$s", Seconds[k]), ("$t", now - (days * 86_400_000L)));
            }
        }

        Schema.Run(connection, "DELETE FROM picture WHERE array=$a AND time<$t", ("$a", array), ("$t", now - (retentionDays * 86_400_000L)));
        foreach (string sql in (string[])
        [
            "DELETE FROM audit WHERE alert IN (SELECT id FROM alert WHERE array=$a AND state=$n AND changed<$t)",
            "DELETE FROM alert_change WHERE id IN (SELECT id FROM alert WHERE array=$a AND state=$n AND changed<$t)",
            "DELETE FROM alert WHERE array=$a AND state=$n AND changed<$t",
        ])
        {
            Schema.Run(connection, sql, ("$a", array), ("$n", (int)AlertState.Normal), ("$t", now - (retentionDays * 86_400_000L)));
        }

        Outbox.Prune(connection, array, now);
    }
}
