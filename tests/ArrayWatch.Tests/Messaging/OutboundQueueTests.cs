using ArrayWatch.Messaging.Outbound;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Tests.Messaging;

public sealed class OutboundQueueTests
{
    private readonly OutboundQueue _queue = new();

    [Fact]
    public void Alerts_go_before_reports_and_in_their_order()
    {
        HealthOutput health = Health("aft", 1);
        AlertOutput first = Alert(1), second = Alert(2);
        _queue.Add(health);
        _queue.Add(first);
        _queue.Add(second);

        Assert.Equal([first, second, health], Drain());
    }

    [Fact]
    public void Only_the_newest_report_of_each_array_and_kind_waits()
    {
        HealthOutput newest = Health("aft", 3), other = Health("port", 1);
        CorrectionsOutput corrections = Corrections("aft", 1);
        foreach (MonitorOutput output in new MonitorOutput[] { Health("aft", 1), other, corrections, Health("aft", 2), newest }) _queue.Add(output);

        Assert.Equal(3, _queue.Count);
        Assert.Equal([newest, other, corrections], Drain());
    }

    [Fact]
    public void What_is_not_completed_stays()
    {
        AlertOutput alert = Alert(1);
        _queue.Add(alert);

        Assert.Same(alert, _queue.Peek());
        Assert.Same(alert, _queue.Peek());
        _queue.Complete(alert);
        Assert.Null(_queue.Peek());
    }

    [Fact]
    public void A_report_that_came_while_the_older_was_sent_is_sent_too()
    {
        HealthOutput older = Health("aft", 1), newer = Health("aft", 2);
        _queue.Add(older);
        Assert.Same(older, _queue.Peek());
        _queue.Add(newer);
        _queue.Complete(older);

        Assert.Same(newer, _queue.Peek());
    }

    [Fact]
    public void The_oldest_alert_gives_way_beyond_the_bound()
    {
        for (int i = 0; i < OutboundQueue.MostAlerts; i++) Assert.True(_queue.Add(Alert(i)));
        Assert.False(_queue.Add(Alert(OutboundQueue.MostAlerts)));

        Assert.Equal(OutboundQueue.MostAlerts, _queue.Count);
        Assert.Equal("1", ((AlertOutput)_queue.Peek()!).Alert.Id);
    }

    [Fact]
    public async Task Waiting_ends_when_something_comes()
    {
        Assert.Null(_queue.Peek());
        Task waiting = _queue.WaitAsync(CancellationToken.None);
        Assert.False(waiting.IsCompleted);
        _queue.Add(Alert(1));
        await waiting;
    }

    private List<MonitorOutput> Drain()
    {
        List<MonitorOutput> all = [];
        while (_queue.Peek() is { } output)
        {
            all.Add(output);
            _queue.Complete(output);
        }
        return all;
    }

    private static AlertOutput Alert(int id) => new("aft", DateTimeOffset.UnixEpoch, new AlertEvent
    {
        Id = id.ToString(System.Globalization.CultureInfo.InvariantCulture),
        Array = "aft",
        Kind = "dead",
        State = AlertState.Unacknowledged,
        Priority = AlertPriority.High,
        Channels = ["H01"],
        Indices = [0],
        Onset = DateTimeOffset.UnixEpoch,
        Raised = DateTimeOffset.UnixEpoch,
        Changed = DateTimeOffset.UnixEpoch,
        Estimate = new Dictionary<string, object>(),
        Confidence = 1,
        Advice = "Leave H01 out.",
    });

    private static HealthOutput Health(string array, int second) => new(array, DateTimeOffset.UnixEpoch.AddSeconds(second), new HealthReport
    {
        Time = DateTimeOffset.UnixEpoch.AddSeconds(second),
        Array = array,
        Frames = second,
        Snapshots = second,
        LastSequence = null,
        Refused = new Dictionary<string, long>(),
        Field = new FieldReport(null, 1500, true, new Dictionary<string, double>()),
        Alerts = [],
        Channels = [],
        Ready = true,
        DegreesOfFreedom = 1,
    });

    private static CorrectionsOutput Corrections(string array, int second) => new(array, DateTimeOffset.UnixEpoch.AddSeconds(second), new CorrectionReport
    {
        Time = DateTimeOffset.UnixEpoch,
        Array = array,
        Frequencies = [],
        Channels = [],
        Beams = [],
    });
}
