using System.Diagnostics.Metrics;
using System.Text.Json;
using System.Threading.Channels;
using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Data.Sqlite;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Storage;

/// <summary>
/// The embedded store. One writer commits what waits in a bounded queue, a batch a transaction. When the queue is
/// full, metrics and pictures are left out and counted; alerts and audit lines wait for a place.
/// </summary>
public sealed partial class MetricStore : IMonitorSink, IAsyncDisposable
{
    private const int QueueLength = 4096, BatchLength = 512;

    // The service has ten seconds to end: past this, what a locked or full disk does not take is counted and left.
    private static readonly TimeSpan _patienceAtStop = TimeSpan.FromSeconds(3);
    private readonly Channel<Work> _queue = Channel.CreateBounded<Work>(QueueLength);
    private readonly Dictionary<string, long> _layouts = new(StringComparer.Ordinal);
    private readonly Dictionary<string, string[]> _labels = new(StringComparer.Ordinal);
    private readonly CancellationTokenSource _stop = new();
    private readonly Meter _meter = new("ArrayWatch.Storage");
    private readonly Counter<long> _written, _errors, _leftOut;
    private readonly SqliteConnection _connection;
    private readonly string _reading;
    private readonly MetricRows _metrics;
    private readonly StoreOptions _options;
    private readonly TimeProvider _clock;
    private readonly ILogger<MetricStore> _log;
    private readonly Task _writer;
    private bool _failing;

    /// <summary>Opens or creates the store.</summary>
    /// <exception cref="StoreUnavailableException">The file is corrupt, locked, or cannot be made.</exception>
    public MetricStore(StoreOptions options, IReadOnlyList<ArrayDefinition> arrays, TimeProvider clock, ILogger<MetricStore> log)
    {
        ArgumentNullException.ThrowIfNull(options);
        ArgumentNullException.ThrowIfNull(arrays);
        ArgumentOutOfRangeException.ThrowIfLessThan(options.RetentionDays, 1);
        ArgumentNullException.ThrowIfNull(clock);
        ArgumentNullException.ThrowIfNull(log);
        _options = options;
        _clock = clock;
        _log = log;
        _written = _meter.CreateCounter<long>("arraywatch.storage.written");
        _errors = _meter.CreateCounter<long>("arraywatch.storage.write_errors");
        _leftOut = _meter.CreateCounter<long>("arraywatch.storage.left_out");
        _meter.CreateObservableGauge("arraywatch.storage.queue", () => _queue.Reader.Count);
        _connection = Schema.Open(options.Path);
        _reading = new SqliteConnectionStringBuilder { DataSource = options.Path, Mode = SqliteOpenMode.ReadOnly }.ToString();
        foreach (ArrayDefinition a in arrays) AddLayout(a);
        _metrics = new(_connection, _layouts, options.RetentionDays);
        _writer = Task.Run(WriteAllAsync);
    }

    /// <inheritdoc/>
    public string Name => "store";

    /// <inheritdoc/>
    public ValueTask WriteAsync(MonitorOutput output, CancellationToken cancellation)
    {
        switch (output)
        {
            case AlertOutput:
                return _queue.Writer.WriteAsync(new(output, null, null), cancellation);
            case MetricsOutput or CoherenceOutput:
                if (!_queue.Writer.TryWrite(new(output, null, null))) _leftOut.Add(1);
                break;
        }

        return ValueTask.CompletedTask;
    }

    /// <summary>Completes when all that was given before is committed.</summary>
    public Task FlushAsync(CancellationToken cancellation) => CommitAsync(null, cancellation);

    /// <summary>The oldest rows that a target has not confirmed.</summary>
    internal async Task<IReadOnlyList<OutboxRow>> ReadOutboxAsync(string target, int most, CancellationToken cancellation)
    {
        await using SqliteConnection c = new(_reading);
        await c.OpenAsync(cancellation).ConfigureAwait(false);
        return Outbox.Next(c, target, most);
    }

    /// <summary>Moves a target's cursor; completes when that is committed.</summary>
    internal async Task ConfirmOutboxAsync(string target, long row, CancellationToken cancellation)
    {
        TaskCompletionSource done = new(TaskCreationOptions.RunContinuationsAsynchronously);
        await _queue.Writer.WriteAsync(new(null, null, done, (target, row)), cancellation).ConfigureAwait(false);
        await done.Task.WaitAsync(cancellation).ConfigureAwait(false);
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        if (!_queue.Writer.TryComplete()) return;
        _stop.CancelAfter(_patienceAtStop);
        await _writer.ConfigureAwait(false);
        await _connection.DisposeAsync().ConfigureAwait(false);
        _meter.Dispose();
        _stop.Dispose();
    }

    private void AddLayout(ArrayDefinition array)
    {
        string[] labels = [.. array.Geometry.Channels.Select(c => c.Label)];
        string json = JsonSerializer.Serialize(labels);
        Schema.Run(_connection, "INSERT OR IGNORE INTO layout (array, labels) VALUES ($a,$l)", ("$a", array.Id), ("$l", json));
        _layouts[array.Id] = (long)Schema.Scalar(
            _connection, "SELECT id FROM layout WHERE array=$a AND labels=$l", ("$a", array.Id), ("$l", json))!;
        _labels[array.Id] = labels;
    }

    private async Task CommitAsync(AuditEntry? entry, CancellationToken cancellation)
    {
        TaskCompletionSource done = new(TaskCreationOptions.RunContinuationsAsynchronously);
        await _queue.Writer.WriteAsync(new(null, entry, done), cancellation).ConfigureAwait(false);
        await done.Task.WaitAsync(cancellation).ConfigureAwait(false);
    }

    private async Task WriteAllAsync()
    {
        List<Work> batch = [];
        while (await _queue.Reader.WaitToReadAsync().ConfigureAwait(false))
        {
            while (batch.Count < BatchLength && _queue.Reader.TryRead(out Work? w)) batch.Add(w);
            if (_failing && _stop.IsCancellationRequested)
            {
                _leftOut.Add(batch.Count);
                foreach (Work w in batch) w.Done?.TrySetCanceled(_stop.Token);
                batch.Clear();
                continue;
            }

            await CommitBatchAsync(batch).ConfigureAwait(false);
            batch.Clear();
        }
    }

    /// <summary>Tries until it succeeds or the service stops; the batch is one transaction, so a retry repeats nothing.</summary>
    private async Task CommitBatchAsync(List<Work> batch)
    {
        TimeSpan wait = TimeSpan.FromSeconds(0.1);
        DateTimeOffset? logged = null;
        while (true)
        {
            try
            {
                using (SqliteTransaction t = _connection.BeginTransaction())
                {
                    foreach (Work w in batch) Store(w);
                    t.Commit();
                }

                _failing = false;
                _written.Add(batch.Count);
                foreach (Work w in batch) w.Done?.TrySetResult();
                return;
            }
            catch (Exception e) when (e is not SqliteException)
            {
                // One item that cannot be stored must not hold up the others for ever.
                if (batch.Count == 1)
                {
                    _leftOut.Add(1);
                    LogLeftOut(e.Message);
                    batch[0].Done?.TrySetException(e);
                    return;
                }

                foreach (Work w in batch.ToArray()) await CommitBatchAsync([w]).ConfigureAwait(false);
                return;
            }
            catch (SqliteException e)
            {
                _failing = true;
                _errors.Add(1);
                DateTimeOffset now = _clock.GetUtcNow();
                if (logged is null || now - logged >= TimeSpan.FromMinutes(1))
                {
                    LogWriteFailed(e.Message);
                    logged = now;
                }

                try
                {
                    await Task.Delay(wait, _clock, _stop.Token).ConfigureAwait(false);
                }
                catch (OperationCanceledException)
                {
                    _leftOut.Add(batch.Count);
                    LogLeftOut(e.Message);
                    foreach (Work w in batch) w.Done?.TrySetException(e);
                    return;
                }

                wait = TimeSpan.FromSeconds(Math.Min(30, wait.TotalSeconds * 2));
            }
        }
    }

    private void Store(Work work)
    {
        switch (work.Output)
        {
            case MetricsOutput m:
                _metrics.Write(m.Array, m.Time, m.Metrics);
                if (_options.KeepsOutbox) Outbox.Add(_connection, Outbox.MetricsKind, m.Array, m.Time, m.Metrics);
                break;
            case AlertOutput { Alert: var a }:
                byte[] body = ReportJson.Write(a);
                Schema.Run(_connection, """
                    INSERT INTO alert VALUES ($i,$a,$s,$r,$c,$b)
                    ON CONFLICT (id) DO UPDATE SET state=excluded.state, changed=excluded.changed, body=excluded.body WHERE excluded.changed>=alert.changed
                    """, ("$i", a.Id), ("$a", a.Array), ("$s", (int)a.State), ("$r", a.Raised.ToUnixTimeMilliseconds()), ("$c", a.Changed.ToUnixTimeMilliseconds()), ("$b", body));
                Schema.Run(_connection, "INSERT OR IGNORE INTO alert_change (id, body) VALUES ($i,$b)", ("$i", a.Id), ("$b", body));
                if (_options.KeepsOutbox) Outbox.Add(_connection, Outbox.AlertKind, a.Array, a.Changed, a);
                break;
            case CoherenceOutput { Picture: var p } c:
                Schema.Run(_connection, """
                    INSERT INTO picture (array, time, frequency, scale, body) VALUES ($a,$t,$f,$s,$b)
                    ON CONFLICT (array, time, frequency, scale) DO UPDATE SET body=excluded.body
                    """, ("$a", c.Array), ("$t", p.Time.ToUnixTimeMilliseconds()), ("$f", p.Frequency), ("$s", p.Scale), ("$b", PictureCodec.Write(p)));
                break;
        }

        if (work.Confirmed is { } confirmed) Outbox.Confirm(_connection, confirmed.Target, confirmed.Row);
        if (work.Audit is { } e)
            Schema.Run(_connection, "INSERT INTO audit (alert, body) VALUES ($a,$b)", ("$a", e.Alert), ("$b", ReportJson.Write(e)));
    }

    [LoggerMessage(Level = LogLevel.Error, Message = "The store cannot be written ({Cause}); it is tried again")]
    private partial void LogWriteFailed(string cause);

    [LoggerMessage(Level = LogLevel.Error, Message = "The store leaves out what it cannot keep ({Cause})")]
    private partial void LogLeftOut(string cause);

    private sealed record Work(MonitorOutput? Output, AuditEntry? Audit, TaskCompletionSource? Done, (string Target, long Row)? Confirmed = null);
}
