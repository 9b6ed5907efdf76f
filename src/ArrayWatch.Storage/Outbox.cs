using System.IO.Compression;
using System.Text.Json;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Data.Sqlite;

namespace ArrayWatch.Storage;

/// <summary>
/// Rows that wait to be sent on, written in the transaction that stores them, so that what is kept is also sent, once. Each target has
/// a cursor: the last row that it has confirmed.
/// </summary>
internal static class Outbox
{
    public const int MetricsKind = 0;
    public const int AlertKind = 1;

    // A link that has been away for longer than this has lost the oldest copies; the store itself still has them.
    private const long LongestWaitMilliseconds = 45L * 86_400_000;

    public static void Add<T>(SqliteConnection c, int kind, string array, DateTimeOffset time, T body)
    {
        using MemoryStream bytes = new();
        using (BrotliStream squeeze = new(bytes, CompressionLevel.Fastest, leaveOpen: true)) JsonSerializer.Serialize(squeeze, body, ReportJson.Options);
        Schema.Run(c, "INSERT INTO outbox (kind, array, time, body) VALUES ($k,$a,$t,$b)",
            ("$k", kind), ("$a", array), ("$t", time.ToUnixTimeMilliseconds()), ("$b", bytes.ToArray()));
    }

    /// <summary>The oldest rows behind the target's cursor.</summary>
    public static IReadOnlyList<OutboxRow> Next(SqliteConnection c, string target, int most)
    {
        List<OutboxRow> rows = [];
        using SqliteCommand k = Schema.Command(c, """
            SELECT row, kind, array, time, body FROM outbox
            WHERE row > COALESCE((SELECT row FROM cursor WHERE target=$t), 0) ORDER BY row LIMIT $n
            """, ("$t", target), ("$n", most));
        using SqliteDataReader r = k.ExecuteReader();
        while (r.Read())
            rows.Add(new(r.GetInt64(0), r.GetInt32(1), r.GetString(2), DateTimeOffset.FromUnixTimeMilliseconds(r.GetInt64(3)), r.GetFieldValue<byte[]>(4)));
        return rows;
    }

    /// <summary>Moves the target's cursor to a row that it has confirmed, and drops what no target waits for.</summary>
    public static void Confirm(SqliteConnection c, string target, long row)
    {
        Schema.Run(c, "INSERT INTO cursor VALUES ($t,$r) ON CONFLICT (target) DO UPDATE SET row=excluded.row", ("$t", target), ("$r", row));
        Schema.Run(c, "DELETE FROM outbox WHERE row <= (SELECT MIN(row) FROM cursor)");
    }

    public static void Prune(SqliteConnection c, string array, long now) =>
        Schema.Run(c, "DELETE FROM outbox WHERE array=$a AND time<$t", ("$a", array), ("$t", now - LongestWaitMilliseconds));

    public static T Read<T>(byte[] body)
    {
        using BrotliStream spread = new(new MemoryStream(body), CompressionMode.Decompress);
        return JsonSerializer.Deserialize<T>(spread, ReportJson.Options)!;
    }
}

/// <summary>One row that waits.</summary>
internal sealed record OutboxRow(long Row, int Kind, string Array, DateTimeOffset Time, byte[] Body);
