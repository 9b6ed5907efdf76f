using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring;

internal sealed partial class ArrayPipeline
{
    [LoggerMessage(3001, LogLevel.Information, "{Array}: a stream begins ({Sign}) at sequence {Sequence} with {Bins} bins")]
    private partial void LogStreamBegins(string array, StreamBegin sign, ulong sequence, int bins);

    [LoggerMessage(3002, LogLevel.Information, "{Array}: alert {Kind} {Cause} is {State}, priority {Priority}, channels {Channels} ({Alert})")]
    private partial void LogAlert(string array, string kind, string? cause, AlertState state, AlertPriority priority, string channels, string alert);

    [LoggerMessage(3003, LogLevel.Error, "{Array}: the decision at event time {TimeSeconds} s failed; what was known stands")]
    private partial void LogDecisionFailed(Exception failure, string array, double timeSeconds);

    [LoggerMessage(3004, LogLevel.Warning, "{Array}: nothing has arrived for {Seconds} s")]
    private partial void LogSilence(string array, double seconds);

    [LoggerMessage(3005, LogLevel.Debug, "{Array}: an environment reading was left aside: {Reason}")]
    private partial void LogReadingLeftAside(string array, string reason);
}
