using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Hosting;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Extensions.Logging.Abstractions;
using Microsoft.Extensions.Time.Testing;

namespace ArrayWatch.Tests.Monitoring;

/// <summary>A pipeline with a clock that stands still unless moved, and what it has told.</summary>
internal sealed class PipelineHarness : IDisposable
{
    private readonly MonitorMeter _meter = new();

    public PipelineHarness(ArrayDefinition? array = null)
    {
        Pipeline = new ArrayPipeline(array ?? FrameMaker.Array(), Outputs.Add, () => Changes++, Clock, _meter, NullLogger.Instance);
    }

    public FakeTimeProvider Clock { get; } = new(new DateTimeOffset(2026, 5, 1, 4, 0, 0, TimeSpan.Zero));

    public List<MonitorOutput> Outputs { get; } = [];

    public int Changes { get; private set; }

    public ArrayPipeline Pipeline { get; }

    public IEnumerable<AlertEvent> Alerts => Outputs.OfType<AlertOutput>().Select(o => o.Alert);

    public IEnumerable<AlertEvent> StreamAlerts(string cause) => Alerts.Where(a => a.Kind == "stream" && a.Cause == cause);

    public void Dispose() => _meter.Dispose();
}
