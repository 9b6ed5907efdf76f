using System.Collections.Concurrent;
using ArrayWatch.Monitoring.Hosting;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Extensions.Logging.Abstractions;

namespace ArrayWatch.Tests.Monitoring;

public sealed class OutputDispatcherTests
{
    private static readonly DateTimeOffset Time = new(2026, 5, 1, 4, 0, 0, TimeSpan.Zero);

    [Fact]
    public async Task A_sink_that_stands_still_loses_no_alert_and_does_not_stop_the_others()
    {
        using MonitorMeter meter = new();
        StandingSink slow = new();
        StandingSink quick = new();
        quick.Open.SetResult();
        using OutputDispatcher dispatcher = new([slow, quick], TimeProvider.System, meter, NullLogger<OutputDispatcher>.Instance);
        await dispatcher.StartAsync(TestContext.Current.CancellationToken);
        for (int i = 0; i < SinkLane.Capacity + 50; i++) dispatcher.Post(Metrics(i));
        for (int i = 0; i < 50; i++) dispatcher.Post(Alert(i));
        Assert.True(dispatcher.LeftOut > 0);
        slow.Open.SetResult();
        await dispatcher.StopAsync(TestContext.Current.CancellationToken);
        Assert.Equal(50, slow.Taken.OfType<AlertOutput>().Count());
        Assert.Equal(50, quick.Taken.OfType<AlertOutput>().Count());
        Assert.Equal(2 * (SinkLane.Capacity + 50), slow.Taken.OfType<MetricsOutput>().Count() + quick.Taken.OfType<MetricsOutput>().Count() + dispatcher.LeftOut);
        Assert.Equal(quick.Taken.Select(o => o.Time).Order(), quick.Taken.Select(o => o.Time).ToArray());
    }

    [Fact]
    public async Task A_sink_that_throws_gets_the_alert_again()
    {
        using MonitorMeter meter = new();
        FailingSink sink = new();
        using OutputDispatcher dispatcher = new([sink], TimeProvider.System, meter, NullLogger<OutputDispatcher>.Instance);
        await dispatcher.StartAsync(TestContext.Current.CancellationToken);
        dispatcher.Post(Alert(1));
        await dispatcher.StopAsync(TestContext.Current.CancellationToken);
        Assert.Equal(2, sink.Calls);
    }

    private static MetricsOutput Metrics(int i) =>
        new("aft", Time.AddSeconds(i), new MetricSet(new Dictionary<string, float[]>(), new Dictionary<string, double>()));

    private static AlertOutput Alert(int i) => new("aft", Time.AddDays(1).AddSeconds(i), new AlertEvent
    {
        Id = $"{i}",
        Array = "aft",
        Kind = "dead",
        State = AlertState.Unacknowledged,
        Priority = AlertPriority.Low,
        Channels = [],
        Indices = [],
        Onset = Time,
        Raised = Time,
        Changed = Time,
        Estimate = new Dictionary<string, object>(),
        Confidence = 1,
        Advice = "",
    });

    private sealed class StandingSink : IMonitorSink
    {
        public TaskCompletionSource Open { get; } = new(TaskCreationOptions.RunContinuationsAsynchronously);

        public ConcurrentQueue<MonitorOutput> Taken { get; } = new();

        public string Name => "standing";

        public async ValueTask WriteAsync(MonitorOutput output, CancellationToken cancellation)
        {
            await Open.Task.WaitAsync(cancellation);
            Taken.Enqueue(output);
        }
    }

    private sealed class FailingSink : IMonitorSink
    {
        public int Calls { get; private set; }

        public string Name => "failing";

        public ValueTask WriteAsync(MonitorOutput output, CancellationToken cancellation) =>
            ++Calls == 1 ? throw new IOException("the far end is away") : ValueTask.CompletedTask;
    }
}
