using System.Text.Json;
using System.Text.Json.Serialization;
using ArrayWatch.Messaging.Connection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using MQTTnet;
using MQTTnet.Exceptions;
using MQTTnet.Formatter;
using MQTTnet.Protocol;

namespace ArrayWatch.Messaging.Outbound;

/// <summary>
/// Publishes what waits in the queue, one message after the other at QoS 1, over a connection of its own: what the
/// arrays send never delays an alert. The connection carries the will, so that the status follows this service's life.
/// </summary>
internal sealed partial class PublisherService(
    OutboundQueue queue, IArrayDirectory directory, MqttOptions options, MessagingMetrics metrics, TimeProvider time, ILogger<PublisherService> logger)
    : BackgroundService
{
    private static readonly TimeSpan _answerLimit = TimeSpan.FromSeconds(15);
    private static readonly TimeSpan _goodbyeLimit = TimeSpan.FromSeconds(3);
    private static readonly JsonSerializerOptions _statusJson = new(JsonSerializerDefaults.Web) { DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull };
    private readonly string _statusTopic = Topics.Status(options.TopicPrefix);
    private readonly VersionChoice _version = new(options.Version);
    private readonly ReconnectSchedule _schedule = new(new Random());
    private string? _lastTrouble;

    /// <inheritdoc/>
    public override Task StartAsync(CancellationToken cancellationToken)
    {
        _ = Credentials.Password(options);
        return base.StartAsync(cancellationToken);
    }

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        // The host must not wait for the first connection.
        await Task.Yield();
        while (!stoppingToken.IsCancellationRequested)
        {
            string trouble;
            try
            {
                await ConnectAndPublishAsync(stoppingToken).ConfigureAwait(false);
                return;
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
            catch (BrokerRefusedException exception) when (exception.RefusesVersion && _version.Refuse())
            {
                LogFallsBack(exception.Message);
                continue;
            }
            catch (Exception exception)
            {
                // Nothing that befalls one connection ends the service: it waits and connects again.
                trouble = exception is OperationCanceledException ? "the broker did not answer in time" : exception.Message;
                if (!ConnectTrouble.IsExpected(exception)) LogUnexpected(exception);
            }
            TimeSpan pause = _schedule.Next();
            if (trouble != _lastTrouble) LogDisconnected(trouble, pause.TotalSeconds);
            _lastTrouble = trouble;
            await Task.Delay(pause, time, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }
    }

    /// <summary>Returns when it is told to stop and has said goodbye; throws when the connection is lost.</summary>
    private async Task ConnectAndPublishAsync(CancellationToken stopping)
    {
        using IMqttClient client = new MqttClientFactory().CreateMqttClient();
        using CancellationTokenSource lost = CancellationTokenSource.CreateLinkedTokenSource(stopping);
        client.DisconnectedAsync += _ => CancelAsync(lost);
        MqttProtocolVersion version = _version.Current;
        await ConnectAsync(client, stopping).ConfigureAwait(false);
        metrics.Connected(options.ClientId);
        try
        {
            await PublishStatusAsync(client, "online", stopping).ConfigureAwait(false);
            LogConnected(options.ClientId, version, queue.Count);
            _lastTrouble = null;
            _schedule.Reset();
            while (true)
            {
                if (queue.Peek() is { } output) await PublishAsync(client, output, lost.Token).ConfigureAwait(false);
                else await queue.WaitAsync(lost.Token).ConfigureAwait(false);
            }
        }
        catch (OperationCanceledException) when (stopping.IsCancellationRequested)
        {
            await SayGoodbyeAsync(client).ConfigureAwait(false);
        }
        catch (OperationCanceledException) when (lost.IsCancellationRequested)
        {
            throw new MqttCommunicationException("The connection was lost.");
        }
        finally
        {
            metrics.Disconnected();
        }
    }

    private static async Task CancelAsync(CancellationTokenSource source)
    {
        try
        {
            await source.CancelAsync().ConfigureAwait(false);
        }
        catch (ObjectDisposedException)
        {
            // The client tells of its end when nobody waits for it any more.
        }
    }

    private async Task ConnectAsync(IMqttClient client, CancellationToken stopping)
    {
        using CancellationTokenSource limit = CancellationTokenSource.CreateLinkedTokenSource(stopping);
        limit.CancelAfter(_answerLimit);
        try
        {
            MqttClientConnectResult result = await client.ConnectAsync(ClientOptions(), limit.Token).ConfigureAwait(false);
            if (result.ResultCode != MqttClientConnectResultCode.Success)
            {
                throw new BrokerRefusedException($"The broker refuses the connection ({result.ResultCode}); check its log, broker.userName and broker.passwordFile.",
                    result.ResultCode == MqttClientConnectResultCode.UnsupportedProtocolVersion);
            }
            _version.Accept();
        }
        catch (MQTTnet.Adapter.MqttConnectingFailedException exception) when (!limit.IsCancellationRequested)
        {
            throw new BrokerRefusedException($"The broker closed the connection before it answered ({exception.Message}).", refusesVersion: true);
        }
    }

    private async Task PublishAsync(IMqttClient client, MonitorOutput output, CancellationToken cancellation)
    {
        (string kind, bool retain, byte[] body) = output switch
        {
            AlertOutput alert => ("alerts", false, ReportJson.Write(alert.Alert)),
            HealthOutput health => ("health", true, ReportJson.Write(health.Health)),
            CorrectionsOutput corrections => ("corrections", true, ReportJson.Write(corrections.Corrections)),
            _ => throw new InvalidOperationException($"No topic for {output.GetType().Name}."),
        };
        string topic = Topics.Of(options.TopicPrefix, output.Array, kind);
        string? refusal = await SendAsync(client, topic, retain, body, cancellation).ConfigureAwait(false);
        // A message that the broker will not take is not sent again and again: it would hold up all others.
        queue.Complete(output);
        if (refusal is null)
        {
            metrics.Published(kind);
            return;
        }
        metrics.LeftOut();
        LogRefused(topic, refusal);
    }

    private async Task PublishStatusAsync(IMqttClient client, string state, CancellationToken cancellation)
    {
        string version = typeof(PublisherService).Assembly.GetName().Version?.ToString(3) ?? "";
        ServiceStatus status = new(state, time.GetUtcNow(), version, [.. directory.Inboxes.Select(static i => i.Id)]);
        string? refusal = await SendAsync(client, _statusTopic, retain: true, JsonSerializer.SerializeToUtf8Bytes(status, _statusJson), cancellation).ConfigureAwait(false);
        if (refusal is not null) LogRefused(_statusTopic, refusal);
    }

    /// <summary>Null when the broker has taken it; otherwise its reason.</summary>
    private static async Task<string?> SendAsync(IMqttClient client, string topic, bool retain, byte[] body, CancellationToken cancellation)
    {
        using CancellationTokenSource limit = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        limit.CancelAfter(_answerLimit);
        MqttApplicationMessageBuilder message = new MqttApplicationMessageBuilder()
            .WithTopic(topic).WithPayload(body).WithRetainFlag(retain).WithQualityOfServiceLevel(MqttQualityOfServiceLevel.AtLeastOnce);
        if (client.Options.ProtocolVersion == MqttProtocolVersion.V500) message = message.WithContentType("application/json");
        MqttClientPublishResult result = await client.PublishAsync(message.Build(), limit.Token).ConfigureAwait(false);
        return result.IsSuccess ? null : $"{result.ReasonCode} {result.ReasonString}".TrimEnd();
    }

    /// <summary>Sends what still waits, as far as there is time, and says "offline" itself, so that the will is not needed.</summary>
    private async Task SayGoodbyeAsync(IMqttClient client)
    {
        using CancellationTokenSource limit = new(_goodbyeLimit);
        try
        {
            while (queue.Peek() is { } output) await PublishAsync(client, output, limit.Token).ConfigureAwait(false);
            await PublishStatusAsync(client, "offline", limit.Token).ConfigureAwait(false);
            await client.DisconnectAsync(new MqttClientDisconnectOptions(), limit.Token).ConfigureAwait(false);
        }
        catch (Exception exception) when (exception is MqttCommunicationException or OperationCanceledException or InvalidOperationException)
        {
            LogGoodbyeFailed(exception.Message, queue.Count);
        }
    }

    private MqttClientOptions ClientOptions()
    {
        MqttClientOptionsBuilder builder = new MqttClientOptionsBuilder()
            .WithTcpServer(options.Embedded ? "127.0.0.1" : options.Host, options.Port)
            .WithProtocolVersion(_version.Current)
            .WithClientId(options.ClientId)
            .WithCleanStart()
            .WithKeepAlivePeriod(options.KeepAlive)
            .WithTimeout(_answerLimit)
            .WithWillTopic(_statusTopic)
            .WithWillPayload(JsonSerializer.SerializeToUtf8Bytes(new ServiceStatus("offline", null, null, null), _statusJson))
            .WithWillQualityOfServiceLevel(MqttQualityOfServiceLevel.AtLeastOnce)
            .WithWillRetain();
        if (options.UserName is not null) builder = builder.WithCredentials(options.UserName, Credentials.Password(options) ?? "");
        if (options.UseTls && !options.Embedded) builder = builder.WithTlsOptions(static tls => tls.UseTls());
        return builder.Build();
    }

    [LoggerMessage(EventIds.PublisherConnected, LogLevel.Information, "{Client}: connected to the broker for publishing ({Version}); {Waiting} reports wait")]
    private partial void LogConnected(string client, MqttProtocolVersion version, int waiting);

    [LoggerMessage(EventIds.PublisherDisconnected, LogLevel.Warning, "No connection to the broker for publishing: {Trouble}; trying again in {Seconds:F1} s and on")]
    private partial void LogDisconnected(string trouble, double seconds);

    [LoggerMessage(EventIds.PublisherFailed, LogLevel.Error, "Publishing to the broker ended in an unexpected way")]
    private partial void LogUnexpected(Exception exception);

    [LoggerMessage(EventIds.PublisherFallsBack, LogLevel.Warning, "Publishing by MQTT 3.1.1, since the broker does not take MQTT 5: {Trouble}")]
    private partial void LogFallsBack(string trouble);

    [LoggerMessage(EventIds.PublishRefused, LogLevel.Error, "The broker refuses a message under {Topic}: {Reason}; give this client the right to write there")]
    private partial void LogRefused(string topic, string reason);

    [LoggerMessage(EventIds.GoodbyeFailed, LogLevel.Warning, "The goodbye did not reach the broker: {Trouble}; {Waiting} reports are left unsent")]
    private partial void LogGoodbyeFailed(string trouble, int waiting);
}
