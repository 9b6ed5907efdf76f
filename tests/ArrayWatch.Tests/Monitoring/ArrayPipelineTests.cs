using System.Text;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Tests.Monitoring;

public sealed class ArrayPipelineTests : IDisposable
{
    private readonly PipelineHarness _harness = new();
    private readonly PipelineHarness _minute = new(FrameMaker.Array(timeConstant: 60));
    private readonly FrameMaker _maker = new();

    public void Dispose()
    {
        _harness.Dispose();
        _minute.Dispose();
    }

    [Fact]
    public void Health_comes_at_least_once_a_minute_of_event_time_and_metrics_at_most_every_ten_seconds()
    {
        Send(600, _minute);
        DateTimeOffset[] health = [.. _minute.Outputs.OfType<HealthOutput>().Select(o => o.Time)];
        DateTimeOffset[] metrics = [.. _minute.Outputs.OfType<MetricsOutput>().Select(o => o.Time)];
        Assert.True(health.Length >= 10);
        Assert.All(health.Zip(health.Skip(1)), p => Assert.True(p.Second - p.First <= TimeSpan.FromMinutes(1)));
        Assert.All(metrics.Zip(metrics.Skip(1)), p => Assert.True(p.Second - p.First >= TimeSpan.FromSeconds(10)));
        Assert.True(metrics.Length >= 50);
        Assert.True(_minute.Outputs.OfType<CorrectionsOutput>().Count() >= health.Length);
    }

    [Fact]
    public void The_same_frames_give_the_same_bytes_at_any_speed()
    {
        using PipelineHarness other = new();
        FrameMaker again = new();
        for (int i = 0; i < 200; i++)
        {
            bool lost = i is 40 or (> 60 and < 80);
            Play(_maker, _harness, lost, TimeSpan.FromMilliseconds(10));
            Play(again, other, lost, TimeSpan.FromSeconds(1));
        }

        Assert.NotEmpty(_harness.Outputs);
        Assert.Equal(Serialise(_harness), Serialise(other));
    }

    [Fact]
    public void A_single_lost_frame_is_counted_and_raises_nothing()
    {
        Send(60);
        _maker.Step();
        Send(60);
        Assert.Empty(_harness.StreamAlerts("frames missing"));
        Assert.Equal(1, _harness.Outputs.OfType<MetricsOutput>().Last().Metrics.Field["framesMissing"]);
    }

    [Fact]
    public void A_long_gap_raises_an_alert_that_returns_when_the_stream_has_been_whole_for_ten_minutes()
    {
        Send(60, _minute);
        for (int i = 0; i < 11; i++) _maker.Step();
        Send(12, _minute);
        AlertEvent raised = Assert.Single(_minute.StreamAlerts("frames missing"));
        Assert.Equal(11.0, raised.Estimate["framesMissing"]);
        Send(630, _minute);
        Assert.Equal(AlertState.ReturnedUnacknowledged, _minute.StreamAlerts("frames missing").Last().State);
    }

    [Fact]
    public void Refusals_are_counted_by_reason_and_raise_an_alert_beyond_a_rate()
    {
        Send(20);
        for (int i = 0; i < 12; i++) _harness.Pipeline.Refuse(new Refusal(RefusalReason.NotDecodable, "no map"));
        Send(10);
        Assert.Single(_harness.StreamAlerts("messages refused"));
        Assert.Equal(12, _harness.Pipeline.View.Health?.Refused["not-decodable"]);
    }

    [Fact]
    public void A_value_that_is_not_finite_spoils_its_snapshot_alone_and_names_its_channel()
    {
        Send(20);
        for (int i = 0; i < 12; i++)
        {
            float[] data = _maker.Data();
            data[2 * 2] = float.NaN;
            Assert.Null(_maker.Send(_harness.Pipeline, data));
        }

        Send(4);
        AlertEvent alert = Assert.Single(_harness.StreamAlerts("values not finite"));
        Assert.Equal(["H3"], alert.Channels);
        HealthReport health = _harness.Pipeline.View.Health!;
        Assert.Equal((4 * health.Frames) - 12, health.Snapshots);
    }

    [Fact]
    public void Nothing_arriving_is_told_by_the_wall_clock_and_ends_with_the_next_frame()
    {
        Send(20);
        _harness.Clock.Advance(TimeSpan.FromSeconds(60));
        _harness.Pipeline.Tick();
        Assert.Empty(_harness.StreamAlerts("nothing arriving"));
        _harness.Clock.Advance(TimeSpan.FromSeconds(1));
        _harness.Pipeline.Tick();
        _harness.Pipeline.Tick();
        Assert.Single(_harness.StreamAlerts("nothing arriving"));
        Assert.Equal("silent", _harness.Pipeline.View.Overview.Standing);
        Send(1);
        Assert.Equal(AlertState.ReturnedUnacknowledged, _harness.StreamAlerts("nothing arriving").Last().State);
        Assert.NotEqual("silent", _harness.Pipeline.View.Overview.Standing);
    }

    [Fact]
    public void An_array_that_never_sent_waits_and_then_is_told_of()
    {
        Assert.Equal("waiting", _harness.Pipeline.View.Overview.Standing);
        _harness.Clock.Advance(TimeSpan.FromSeconds(61));
        _harness.Pipeline.Tick();
        Assert.Single(_harness.StreamAlerts("nothing arriving"));
    }

    [Fact]
    public void A_shot_does_not_own_the_estimate()
    {
        Send(60);
        _maker.Factor = (k, _) => k == 1 ? 1000 : 1;
        Send(1);
        _maker.Factor = (_, _) => 1;
        Send(4);
        Assert.Equal(1, _harness.Outputs.OfType<MetricsOutput>().Last().Metrics.Field["transientSnapshots"]);
        CoherencePicture picture = _harness.Pipeline.Coherence(200, "fast")!;
        Assert.True(picture.Magnitude[1] < 0.5, $"{picture.Magnitude[1]}");
    }

    [Fact]
    public void A_channel_out_of_service_is_no_longer_used_and_spoils_nothing()
    {
        Send(20);
        for (int i = 0; i < 12; i++)
        {
            float[] data = _maker.Data();
            for (int at = 2 * 2; at < data.Length; at += 8) data[at] = float.NaN;
            _maker.Send(_harness.Pipeline, data);
        }

        Send(4);
        string id = _harness.StreamAlerts("values not finite").First().Id;
        _harness.Pipeline.Act(new AlertAction(id, AlertVerb.OutOfService, "Kari", "", null));
        long before = _harness.Pipeline.View.Health!.Snapshots;
        float[] spoilt = _maker.Data();
        for (int at = 2 * 2; at < spoilt.Length; at += 8) spoilt[at] = float.NaN;
        _maker.Send(_harness.Pipeline, spoilt);
        Send(4);
        Assert.True(_harness.Pipeline.View.Health!.Snapshots >= before + 8);
        Assert.False(_harness.Pipeline.View.Corrections!.Channels[2].Use);
        Assert.Equal(ArrayWatch.Detection.Standing.OutOfService, _harness.Pipeline.View.Health!.Channels[2].Standing);
    }

    [Fact]
    public void An_unknown_scale_is_an_error_and_no_data_is_null()
    {
        Assert.Null(_harness.Pipeline.Coherence(100, "fast"));
        Assert.Throws<ArgumentException>(() => _harness.Pipeline.Coherence(100, "hourly"));
    }

    [Fact]
    public void A_reading_moves_the_sound_speed_of_the_next_decision()
    {
        _harness.Pipeline.Accept(new EnvironmentReading { SoundSpeed = 1480 });
        _harness.Pipeline.Accept(new EnvironmentReading { SoundSpeed = -3 });
        Send(10);
        Assert.Equal(1480, _harness.Pipeline.View.Overview.SoundSpeed);
    }

    private static void Play(FrameMaker maker, PipelineHarness harness, bool lost, TimeSpan wall)
    {
        harness.Clock.Advance(wall);
        float[] data = maker.Data();
        if (lost) maker.Step();
        else maker.Send(harness.Pipeline, data);
    }

    private static string Serialise(PipelineHarness harness)
    {
        StringBuilder text = new();
        foreach (MonitorOutput o in harness.Outputs) text.AppendLine(Encoding.UTF8.GetString(ReportJson.Write<object>(o)));
        return text.ToString();
    }

    private void Send(int seconds) => Send(seconds, _harness);

    private void Send(int seconds, PipelineHarness harness)
    {
        for (int i = 0; i < seconds; i++) Assert.Null(_maker.Send(harness.Pipeline));
    }
}
