using System.Text.Json;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Data.Sqlite;

namespace ArrayWatch.Storage;

public sealed partial class MetricStore : IHistory
{
    /// <inheritdoc/>
    public Task<TrendSeries> TrendAsync(
        string array, string metric, int? channel, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation) =>
        Task.Run(() =>
        {
            Summary[] bins = Bins(array, metric, channel is null, from, to, points, cancellation);
            int i = channel ?? 0;
            bool known = bins.Length > 0 && i >= 0 && i < bins[0].Channels;
            double[] Pick(Func<Summary, double> value) => [.. bins.Select(b => known ? value(b) : double.NaN)];
            return new TrendSeries(Times(from, to, points), Pick(b => b.Mean(i)), Pick(b => b.Minimum(i)), Pick(b => b.Maximum(i)));
        }, cancellation);

    /// <inheritdoc/>
    public Task<TrendGrid> TrendGridAsync(
        string array, string metric, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation) =>
        Task.Run(() =>
        {
            Summary[] bins = Bins(array, metric, false, from, to, points, cancellation);
            int channels = _labels.TryGetValue(array, out string[]? labels) ? labels.Length : 0;
            return new TrendGrid(Times(from, to, points),
                [.. Enumerable.Range(0, channels).Select(i => bins.Select(b => b.Mean(i)).ToArray())]);
        }, cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlyList<AlertEvent>> AlertsAsync(
        string? array, AlertState? state, DateTimeOffset? from, DateTimeOffset? to, int limit, CancellationToken cancellation) =>
        ReadAsync("""
            SELECT body FROM alert WHERE ($a IS NULL OR array=$a) AND ($s IS NULL OR state=$s) AND ($f IS NULL OR raised>=$f)
            AND ($t IS NULL OR raised<$t) ORDER BY raised DESC, id DESC LIMIT $n
            """, Body<AlertEvent>, cancellation, ("$a", OrNull(array)), ("$s", OrNull((int?)state)),
            ("$f", OrNull(from?.ToUnixTimeMilliseconds())), ("$t", OrNull(to?.ToUnixTimeMilliseconds())), ("$n", limit));

    /// <inheritdoc/>
    public async Task<IReadOnlyList<AlertEvent>> AlertHistoryAsync(string alertId, CancellationToken cancellation)
    {
        IReadOnlyList<AlertEvent> changes = await ReadAsync(
            "SELECT body FROM alert_change WHERE id=$i ORDER BY row", Body<AlertEvent>, cancellation, ("$i", alertId)).ConfigureAwait(false);
        return [.. changes.OrderBy(c => c.Changed)];
    }

    /// <inheritdoc/>
    public Task<IReadOnlyList<AlertEvent>> OpenAlertsAsync(string array, CancellationToken cancellation) =>
        ReadAsync("SELECT body FROM alert WHERE array=$a AND state<>$n ORDER BY raised DESC, id DESC", Body<AlertEvent>, cancellation,
            ("$a", array), ("$n", (int)AlertState.Normal));

    /// <inheritdoc/>
    public Task<IReadOnlyList<CoherenceEntry>> CoherenceEntriesAsync(
        string array, DateTimeOffset from, DateTimeOffset to, CancellationToken cancellation) =>
        ReadAsync("SELECT row, time, frequency FROM picture WHERE array=$a AND time>=$f AND time<$t ORDER BY time DESC",
            r => new CoherenceEntry(r.GetInt64(0), DateTimeOffset.FromUnixTimeMilliseconds(r.GetInt64(1)), r.GetDouble(2)), cancellation,
            ("$a", array), ("$f", from.ToUnixTimeMilliseconds()), ("$t", to.ToUnixTimeMilliseconds()));

    /// <inheritdoc/>
    public async Task<CoherencePicture?> CoherenceAsync(string array, long entry, CancellationToken cancellation)
    {
        IReadOnlyList<CoherencePicture> found = await ReadAsync(
            "SELECT body, time, frequency, scale FROM picture WHERE array=$a AND row=$r",
            r => PictureCodec.Read(r.GetFieldValue<byte[]>(0), DateTimeOffset.FromUnixTimeMilliseconds(r.GetInt64(1)), r.GetDouble(2), r.GetString(3)),
            cancellation, ("$a", array), ("$r", entry)).ConfigureAwait(false);
        return found.Count > 0 ? found[0] : null;
    }

    /// <inheritdoc/>
    public Task AuditAsync(AuditEntry entry, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(entry);
        return CommitAsync(entry, cancellation);
    }

    /// <inheritdoc/>
    public Task<IReadOnlyList<AuditEntry>> AuditLogAsync(string alertId, CancellationToken cancellation) =>
        ReadAsync("SELECT body FROM audit WHERE alert=$i ORDER BY row", Body<AuditEntry>, cancellation, ("$i", alertId));

    private static DateTimeOffset[] Times(DateTimeOffset from, DateTimeOffset to, int points) =>
        [.. Enumerable.Range(0, points).Select(i => from + ((to - from) / points * i))];

    private static object OrNull(object? value) => value ?? DBNull.Value;

    private static T Body<T>(SqliteDataReader r) => JsonSerializer.Deserialize<T>(r.GetFieldValue<byte[]>(0), ReportJson.Options)!;

    /// <summary>Equal intervals over the span, filled from the coarsest level that is no wider than one of them and still kept.</summary>
    private Summary[] Bins(
        string array, string metric, bool field, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(points, 2);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(points, 10_000);
        if (to <= from) throw new ArgumentException($"the end {to:O} is not after the beginning {from:O}", nameof(to));
        long f = from.ToUnixTimeMilliseconds(), t = Math.Max(f + 1, to.ToUnixTimeMilliseconds());
        string[] labels = field ? [""] : _labels.GetValueOrDefault(array, []);
        Summary[] bins = [.. Enumerable.Range(0, points).Select(_ => new Summary(labels.Length))];
        using SqliteConnection c = new(_reading);
        c.Open();
        int level = Array.FindLastIndex(MetricRows.Seconds, s => s * 1000.0 <= (double)(t - f) / points);
        while (level < MetricRows.Seconds.Length - 1 && !Reaches(c, array, metric, level, f, t)) level++;

        Dictionary<long, int[]> maps = [];
        using SqliteCommand k = Schema.Command(c,
            "SELECT time, layout, data FROM metric WHERE array=$a AND name=$n AND seconds=$s AND time>=$f AND time<$t",
            ("$a", array), ("$n", metric), ("$s", MetricRows.Seconds[level]), ("$f", f), ("$t", t));
        using SqliteDataReader r = k.ExecuteReader();
        while (r.Read())
        {
            cancellation.ThrowIfCancellationRequested();
            long layout = r.GetInt64(1);
            if (field != (layout == 0)) continue;
            if (!maps.TryGetValue(layout, out int[]? map)) maps[layout] = map = Map(c, layout, labels);
            Summary row = Summary.Read(r.GetFieldValue<byte[]>(2), level == 0);
            Summary bin = bins[(int)Math.Min(points - 1, (r.GetInt64(0) - f) * (double)points / (t - f))];
            for (int i = 0; i < map.Length; i++)
                if (map[i] >= 0 && map[i] < row.Channels) bin.Add(row, map[i], i);
        }

        return bins;
    }

    /// <summary>True when the level goes back as far into the span as the coarsest does.</summary>
    private static bool Reaches(SqliteConnection c, string array, string metric, int level, long from, long to)
    {
        long? First(int k) => Schema.Scalar(c, "SELECT MIN(time) FROM metric WHERE array=$a AND name=$n AND seconds=$s AND time>=$f AND time<$t",
            ("$a", array), ("$n", metric), ("$s", MetricRows.Seconds[k]), ("$f", from), ("$t", to)) as long?;
        int last = MetricRows.Seconds.Length - 1;
        return First(last) is not { } coarse || (First(level) is { } fine && fine < coarse + (2 * MetricRows.Seconds[last] * 1000L));
    }

    /// <summary>Where each of today's labels stands in a row of the layout; −1 where it does not.</summary>
    private static int[] Map(SqliteConnection c, long layout, string[] labels)
    {
        if (layout == 0) return [0];
        string[] then = Schema.Scalar(c, "SELECT labels FROM layout WHERE id=$i", ("$i", layout)) is string json
            ? JsonSerializer.Deserialize<string[]>(json)! : labels;
        return [.. labels.Select(l => Array.IndexOf(then, l))];
    }

    private Task<IReadOnlyList<T>> ReadAsync<T>(
        string sql, Func<SqliteDataReader, T> row, CancellationToken cancellation, params (string, object)[] values) =>
        Task.Run<IReadOnlyList<T>>(() =>
        {
            using SqliteConnection c = new(_reading);
            c.Open();
            using SqliteCommand k = Schema.Command(c, sql, values);
            using SqliteDataReader r = k.ExecuteReader();
            List<T> all = [];
            while (r.Read())
            {
                cancellation.ThrowIfCancellationRequested();
                all.Add(row(r));
            }

            return all;
        }, cancellation);
}
