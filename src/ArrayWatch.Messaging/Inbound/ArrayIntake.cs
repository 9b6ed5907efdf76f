using System.Text;
using ArrayWatch.Messaging.Connection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>
/// What happens to one array's messages: each is decoded and folded in, or refused and counted; nothing that arrives
/// makes it throw.
/// </summary>
/// <remarks>For one thread at a time.</remarks>
internal sealed partial class ArrayIntake
{
    private readonly byte[] _snapshots, _samples, _environment;
    private readonly IArrayInbox _inbox;
    private readonly MqttOptions _options;
    private readonly SnapshotDecoder _snapshotDecoder;
    private readonly EnvironmentDecoder _environmentDecoder;
    private readonly RefusalLogThrottle _throttle;
    private readonly MessagingMetrics _metrics;
    private readonly ILogger _logger;
    private bool _saidRetained;

    public ArrayIntake(IArrayInbox inbox, MqttOptions options, MessagingMetrics metrics, TimeProvider time, ILogger logger)
    {
        _inbox = inbox;
        _options = options;
        _metrics = metrics;
        _logger = logger;
        _throttle = new RefusalLogThrottle(time);
        _snapshotDecoder = new SnapshotDecoder(options.MaxMessageBytes);
        _environmentDecoder = new EnvironmentDecoder(options.MaxMessageBytes);
        _snapshots = Topic("snapshots");
        _samples = Topic("samples");
        _environment = Topic("environment");
        byte[] Topic(string leaf) => Encoding.UTF8.GetBytes(Topics.Of(options.TopicPrefix, inbox.Id, leaf));
    }

    /// <summary>Deals with one message; when it returns, the message may be acknowledged.</summary>
    public void Take(in ReceivedMessage message)
    {
        string kind = Kind(message.Topic.Span);
        _metrics.Received(_inbox.Id, kind, message.PayloadBytes);
        if (message.Retained && kind != "environment")
        {
            IgnoreRetained(kind);
            return;
        }
        try
        {
            Refusal? refusal = kind switch
            {
                _ when message.IsTooLarge => Count(Decoding.CheckSize(message.PayloadBytes, _options.MaxMessageBytes)),
                "snapshots" => TakeSnapshots(message),
                "environment" => TakeEnvironment(message),
                "samples" => Count(new Refusal(RefusalReason.NotSupported,
                    "Raw sample blocks are not taken by this version; publish narrowband snapshots under …/snapshots.")),
                _ => Count(new Refusal(RefusalReason.NotSupported, $"The topic {Text.Shorten(message.Topic.Span)} was not asked for; check the broker.")),
            };
            if (refusal is not null) Report(refusal);
        }
        catch (Exception exception)
        {
            // One message that the pipeline stumbles over must not stop the stream, nor come back for ever.
            _metrics.Failed(_inbox.Id);
            LogFailed(exception, _inbox.Id);
        }
    }

    private Refusal? TakeSnapshots(in ReceivedMessage message)
    {
        Refusal? refusal = _snapshotDecoder.Decode(message.Payload, message.ContentType, out SnapshotFrame frame);
        return refusal is null ? _inbox.Accept(frame) : Count(refusal);
    }

    private Refusal? TakeEnvironment(in ReceivedMessage message)
    {
        Refusal? refusal = _environmentDecoder.Decode(message.Payload, message.ContentType, out EnvironmentReading? reading);
        if (reading is not null) _inbox.Accept(reading);
        return Count(refusal);
    }

    private Refusal? Count(Refusal? refusal)
    {
        if (refusal is not null) _inbox.Refuse(refusal);
        return refusal;
    }

    private void Report(Refusal refusal)
    {
        _metrics.Refused(_inbox.Id, refusal.Reason);
        if (_throttle.Admit(out long heldBack)) LogRefused(_inbox.Id, refusal.Reason, refusal.Detail, heldBack);
    }

    private void IgnoreRetained(string kind)
    {
        _metrics.RetainedIgnored(_inbox.Id);
        if (_saidRetained) return;
        _saidRetained = true;
        LogRetained(_inbox.Id, kind);
    }

    private string Kind(ReadOnlySpan<byte> topic) => topic switch
    {
        _ when topic.SequenceEqual(_snapshots) => "snapshots",
        _ when topic.SequenceEqual(_samples) => "samples",
        _ when topic.SequenceEqual(_environment) => "environment",
        _ => "other",
    };

    [LoggerMessage(EventIds.MessageRefused, LogLevel.Warning, "Array {Array}: a message was refused ({Reason}): {Detail} Refused since the last such line: {HeldBack}")]
    private partial void LogRefused(string array, RefusalReason reason, string detail, long heldBack);

    [LoggerMessage(EventIds.MessageFailed, LogLevel.Error, "Array {Array}: a message made the pipeline fail and was left out")]
    private partial void LogFailed(Exception exception, string array);

    [LoggerMessage(EventIds.RetainedIgnored, LogLevel.Warning, "Array {Array}: retained messages under {Kind} are left out, since they belong to no running stream; publish them without the retain flag")]
    private partial void LogRetained(string array, string kind);
}
