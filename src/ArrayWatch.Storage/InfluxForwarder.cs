using System.Diagnostics.Metrics;
using System.Text.Json;
using ArrayWatch.Monitoring;
using InfluxDB.Client;
using InfluxDB.Client.Core.Exceptions;
using InfluxDB.Client.Writes;
using Microsoft.Data.Sqlite;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Storage;

/// <summary>
/// Sends what the store keeps on to a time-series server. The cursor moves only when the server has confirmed, and a point's time and tags
/// identify it, so that hours without a link lose nothing and a repeated write changes nothing.
/// </summary>
public sealed partial class InfluxForwarder : BackgroundService
{
    private const int RowsAtOnce = 200;
    private static readonly TimeSpan _pause = TimeSpan.FromSeconds(2);
    private static readonly TimeSpan _longestPause = TimeSpan.FromMinutes(2);

    private readonly MetricStore _store;
    private readonly InfluxOptions _options;
    private readonly Dictionary<string, string[]> _labels;
    private readonly Meter _meter = new("ArrayWatch.Storage");
    private readonly Counter<long> _refused;
    private readonly TimeProvider _clock;
    private readonly ILogger<InfluxForwarder> _log;

    /// <summary>Prepares to forward.</summary>
    public InfluxForwarder(MetricStore store, InfluxOptions options, IReadOnlyList<ArrayDefinition> arrays, TimeProvider clock, ILogger<InfluxForwarder> log)
    {
        ArgumentNullException.ThrowIfNull(arrays);
        (_store, _options, _clock, _log) = (store, options, clock, log);
        _refused = _meter.CreateCounter<long>("arraywatch.storage.forward_refused");
        _labels = arrays.ToDictionary(a => a.Id, a => a.Geometry.Channels.Select(c => c.Label).ToArray());
    }

    private string Target => $"{_options.Url}|{_options.Organization}|{_options.Bucket}";

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        TimeSpan wait = _pause;
        bool down = false;
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                bool more = await ForwardAsync(stoppingToken).ConfigureAwait(false);
                if (down) LogBack(Target);
                (down, wait) = (false, _pause);
                if (more) continue;
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
            catch (Exception e) when (e is HttpException or HttpRequestException or SqliteException or OperationCanceledException)
            {
                if (!down) LogDown(Target, e.Message);
                down = true;
                wait = TimeSpan.FromTicks(Math.Min(_longestPause.Ticks, wait.Ticks * 2));
            }

            try
            {
                await Task.Delay(wait, _clock, stoppingToken).ConfigureAwait(false);
            }
            catch (OperationCanceledException)
            {
                return;
            }
        }
    }

    /// <summary>Sends one batch.</summary>
    /// <returns>True when there may be more at once.</returns>
    internal async Task<bool> ForwardAsync(CancellationToken cancellation)
    {
        IReadOnlyList<OutboxRow> rows = await _store.ReadOutboxAsync(Target, RowsAtOnce, cancellation).ConfigureAwait(false);
        if (rows.Count == 0) return false;
        using InfluxDBClient client = new(new InfluxDBClientOptions(_options.Url.ToString())
        {
            Token = _options.Token.Length > 0 ? _options.Token : null,
            Org = _options.Organization,
            Bucket = _options.Bucket,
        });
        List<PointData> points = [.. rows.SelectMany(Points)];
        if (points.Count > 0)
        {
            try
            {
                await client.GetWriteApiAsync().WritePointsAsync(points, _options.Bucket, _options.Organization, cancellation).ConfigureAwait(false);
            }
            catch (HttpException e) when (e.Status is 400 or 413 or 422)
            {
                if (rows.Count > 1) await OneByOneAsync(client, rows, cancellation).ConfigureAwait(false);
                else Refuse(e.Message);
            }
        }

        await _store.ConfirmOutboxAsync(Target, rows[^1].Row, cancellation).ConfigureAwait(false);
        return rows.Count == RowsAtOnce;
    }

    // The server refuses something in the batch as malformed: only that row is given up.
    private async Task OneByOneAsync(InfluxDBClient client, IReadOnlyList<OutboxRow> rows, CancellationToken cancellation)
    {
        foreach (OutboxRow row in rows)
        {
            try
            {
                List<PointData> points = Points(row);
                if (points.Count > 0) await client.GetWriteApiAsync().WritePointsAsync(points, _options.Bucket, _options.Organization, cancellation).ConfigureAwait(false);
            }
            catch (HttpException e) when (e.Status is 400 or 413 or 422)
            {
                Refuse(e.Message);
            }
        }
    }

    // A row that cannot be read must not hold up those behind it.
    private List<PointData> Points(OutboxRow row)
    {
        try
        {
            return [.. InfluxPoints.Of(row, _labels.GetValueOrDefault(row.Array, []))];
        }
        catch (Exception e) when (e is JsonException or InvalidDataException or NotSupportedException)
        {
            Refuse(e.Message);
            return [];
        }
    }

    private void Refuse(string cause)
    {
        _refused.Add(1);
        LogRefused(cause);
    }

    /// <inheritdoc/>
    public override void Dispose()
    {
        _meter.Dispose();
        base.Dispose();
    }

    [LoggerMessage(Level = LogLevel.Warning, Message = "{Target} cannot be reached ({Cause}); copies wait in the store")]
    private partial void LogDown(string target, string cause);

    [LoggerMessage(Level = LogLevel.Information, Message = "{Target} is reached again")]
    private partial void LogBack(string target);

    [LoggerMessage(Level = LogLevel.Error, Message = "A row is refused by the time-series server and given up ({Cause})")]
    private partial void LogRefused(string cause);
}
