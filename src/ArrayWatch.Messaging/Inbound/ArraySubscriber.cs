using ArrayWatch.Messaging.Connection;
using Microsoft.Extensions.Logging;
using MQTTnet.Formatter;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Keeps one array's connection to the broker and acknowledges each message when it has been dealt with.</summary>
internal sealed partial class ArraySubscriber(
    string array, ArrayIntake intake, MqttOptions options, MessagingMetrics metrics, TimeProvider time, ILogger logger)
{
    private static readonly TimeSpan _connectLimit = TimeSpan.FromSeconds(15);
    private static readonly TimeSpan _goodbyeLimit = TimeSpan.FromSeconds(2);
    private readonly string _clientId = $"{options.ClientId}-{array}";
    private readonly VersionChoice _version = new(options.Version);
    private readonly ReconnectSchedule _schedule = new(new Random());
    private string? _lastTrouble;

    /// <summary>Connects, receives and connects again until it is told to stop.</summary>
    public async Task RunAsync(CancellationToken stopping)
    {
        while (!stopping.IsCancellationRequested)
        {
            string trouble;
            try
            {
                await ConnectAndReceiveAsync(stopping).ConfigureAwait(false);
                if (stopping.IsCancellationRequested) return;
                trouble = "the broker closed the connection";
            }
            catch (OperationCanceledException) when (stopping.IsCancellationRequested)
            {
                return;
            }
            catch (BrokerRefusedException exception) when (exception.RefusesVersion && _version.Refuse())
            {
                LogFallsBack(_clientId, exception.Message);
                continue;
            }
            catch (Exception exception)
            {
                // Nothing that befalls one connection ends the service: it waits and connects again.
                trouble = exception is OperationCanceledException ? "the broker did not answer in time" : exception.Message;
                if (!ConnectTrouble.IsExpected(exception)) LogUnexpected(exception, _clientId);
            }
            await PauseAsync(trouble, stopping).ConfigureAwait(false);
        }
    }

    private async Task ConnectAndReceiveAsync(CancellationToken stopping)
    {
        using CancellationTokenSource limit = CancellationTokenSource.CreateLinkedTokenSource(stopping);
        limit.CancelAfter(_connectLimit);
        MqttProtocolVersion version = _version.Current;
        SubscriberLink link = await SubscriberLink.ConnectAsync(
            options, _clientId, Credentials.Password(options), version, time, limit.Token).ConfigureAwait(false);
        await using (link.ConfigureAwait(false))
        {
            _version.Accept();
            await link.SubscribeAsync(Topics.Subscriptions(options.TopicPrefix, array), limit.Token).ConfigureAwait(false);
            limit.CancelAfter(Timeout.InfiniteTimeSpan);
            LogConnected(_clientId, version, link.SessionPresent);
            _lastTrouble = null;
            metrics.Connected(_clientId);
            long since = time.GetTimestamp();
            try
            {
                await ReceiveAsync(link, stopping).ConfigureAwait(false);
            }
            finally
            {
                metrics.Disconnected();
                // A connection that is lost again at once, as when two clients share an id, keeps its longer pauses.
                if (time.GetElapsedTime(since) > ReconnectSchedule.Longest) _schedule.Reset();
            }
        }
    }

    private async Task ReceiveAsync(SubscriberLink link, CancellationToken stopping)
    {
        try
        {
            while (!stopping.IsCancellationRequested && await link.ReceiveAsync(stopping).ConfigureAwait(false) is { } message)
            {
                intake.Take(message);
                if (message.PacketIdentifier != 0) await link.AcknowledgeAsync(message.PacketIdentifier, stopping).ConfigureAwait(false);
            }
        }
        finally
        {
            if (stopping.IsCancellationRequested)
            {
                using CancellationTokenSource limit = new(_goodbyeLimit);
                try
                {
                    await link.DisconnectAsync(limit.Token).ConfigureAwait(false);
                }
                catch (Exception exception) when (exception is IOException or ObjectDisposedException or OperationCanceledException)
                {
                    // What could not be acknowledged comes again, and is told by its sequence number.
                }
            }
        }
    }

    private async Task PauseAsync(string trouble, CancellationToken stopping)
    {
        TimeSpan pause = _schedule.Next();
        // The same trouble again and again is one line in the log.
        if (trouble != _lastTrouble) LogDisconnected(_clientId, options.Embedded ? "this process" : options.Host, options.Port, trouble, pause.TotalSeconds);
        _lastTrouble = trouble;
        try
        {
            await Task.Delay(pause, time, stopping).ConfigureAwait(false);
        }
        catch (OperationCanceledException)
        {
            // The caller's loop ends.
        }
    }

    [LoggerMessage(EventIds.SubscriberConnected, LogLevel.Information, "{Client}: connected to the broker ({Version}); session kept: {SessionPresent}")]
    private partial void LogConnected(string client, MqttProtocolVersion version, bool sessionPresent);

    [LoggerMessage(EventIds.SubscriberDisconnected, LogLevel.Warning, "{Client}: no connection to the broker at {Host}:{Port}: {Trouble}; trying again in {Seconds:F1} s and on")]
    private partial void LogDisconnected(string client, string host, int port, string trouble, double seconds);

    [LoggerMessage(EventIds.SubscriberFailed, LogLevel.Error, "{Client}: the connection to the broker ended in an unexpected way")]
    private partial void LogUnexpected(Exception exception, string client);

    [LoggerMessage(EventIds.SubscriberFallsBack, LogLevel.Warning, "{Client}: trying MQTT 3.1.1, since the broker does not take MQTT 5: {Trouble}")]
    private partial void LogFallsBack(string client, string trouble);
}
