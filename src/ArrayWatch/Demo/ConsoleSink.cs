using System.Text.Json;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Demo;

/// <summary>Tells each alert on the console in a line that needs no explanation.</summary>
internal sealed class ConsoleSink(DemoClock clock, TextWriter console) : IMonitorSink
{
    private readonly Lock _lock = new();

    /// <inheritdoc/>
    public string Name => "console";

    /// <inheritdoc/>
    public ValueTask WriteAsync(MonitorOutput output, CancellationToken cancellation)
    {
        if (output is AlertOutput { Alert: var alert } && Line(alert) is { } line)
        {
            lock (_lock) console.WriteLine(line);
        }

        return ValueTask.CompletedTask;
    }

    private string? Line(AlertEvent alert)
    {
        string what = $"{alert.Array,-7} {alert.Kind} of {string.Join(", ", alert.Channels)}";
        if (alert.Group is { } group) what += $" (all of {group})";
        return alert.State switch
        {
            AlertState.Unacknowledged =>
                $"{clock.Since(alert.Raised),5}  ALERT    {what}, {Word(alert.Priority)} priority, since {clock.Since(alert.Onset)}{Estimates(alert)}. {alert.Advice}",
            AlertState.ReturnedUnacknowledged or AlertState.Normal =>
                $"{clock.Since(alert.Returned ?? alert.Changed),5}  good     {what} is over",
            _ => null,
        };
    }

    private static string Estimates(AlertEvent alert)
    {
        string[] numbers = [.. alert.Estimate.Where(static e => e.Value is double or float or int).Select(static e => FormattableString.Invariant($"{e.Key} {e.Value:0.##}"))];
        return numbers.Length == 0 ? "" : $" ({string.Join(", ", numbers)})";
    }

    private static string Word(AlertPriority priority) => JsonNamingPolicy.KebabCaseLower.ConvertName(priority.ToString());
}
