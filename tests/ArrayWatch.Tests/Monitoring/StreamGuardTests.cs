using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Streams;
using ArrayWatch.Signals;

namespace ArrayWatch.Tests.Monitoring;

public sealed class StreamGuardTests
{
    private readonly StreamGuard _guard = new(4, TimeSpan.FromSeconds(12), TimeSpan.FromSeconds(120));
    private readonly FrameMaker _maker = new();

    [Fact]
    public void Frames_in_order_are_let_through_and_the_first_begins_a_stream()
    {
        Assert.Equal(StreamBegin.First, Judge().Begins);
        StreamVerdict next = Judge();
        Assert.Null(next.Refusal);
        Assert.Equal(StreamBegin.No, next.Begins);
        Assert.Equal(0, next.GapSeconds);
        Assert.Equal(0UL, next.MissingFrames);
        Assert.Equal(1UL, _guard.LastSequence);
    }

    [Fact]
    public void A_gap_in_the_sequence_counts_the_lost_frames_and_the_time_without_data()
    {
        Judge();
        _maker.Step();
        _maker.Step();
        StreamVerdict verdict = Judge();
        Assert.Null(verdict.Refusal);
        Assert.Equal(2UL, verdict.MissingFrames);
        Assert.Equal(2 * _maker.FrameSeconds, verdict.GapSeconds, 6);
    }

    [Fact]
    public void A_frame_delivered_twice_is_refused_as_repeated()
    {
        Judge();
        _maker.Sequence = 0;
        _maker.Time = FrameMaker.Begin;
        Assert.Equal(RefusalReason.SequenceRepeated, Judge().Refusal?.Reason);
        Assert.Null(Judge().Refusal);
    }

    [Fact]
    public void Time_may_run_back_by_half_an_interval_and_no_further()
    {
        Judge();
        _maker.Time -= 0.12;
        Assert.Null(Judge().Refusal);
        _maker.Time -= 0.13;
        Assert.Equal(RefusalReason.TimeBackwards, Judge().Refusal?.Reason);
    }

    [Fact]
    public void Other_bins_are_refused_until_a_new_stream_begins()
    {
        Judge();
        Judge();
        _maker.Frequencies = [100, 200, 350];
        Assert.Equal(RefusalReason.FrequenciesChanged, Judge().Refusal?.Reason);
        _maker.Sequence = 0;
        StreamVerdict verdict = Judge();
        Assert.Null(verdict.Refusal);
        Assert.Equal(StreamBegin.SequenceRestarted, verdict.Begins);
        Assert.True(verdict.Restart);
    }

    [Fact]
    public void A_restarted_sequence_with_the_same_bins_keeps_what_is_known()
    {
        Judge();
        Judge();
        _maker.Sequence = 0;
        StreamVerdict verdict = Judge();
        Assert.Equal(StreamBegin.SequenceRestarted, verdict.Begins);
        Assert.False(verdict.Restart);
    }

    [Fact]
    public void A_gap_longer_than_ten_slow_memories_begins_a_new_stream()
    {
        Judge();
        _maker.Time += 1201;
        _maker.Frequencies = [50, 60, 70];
        StreamVerdict verdict = Judge();
        Assert.Null(verdict.Refusal);
        Assert.Equal(StreamBegin.LongGap, verdict.Begins);
    }

    [Fact]
    public void A_clock_set_back_is_believed_after_a_run_of_frames_in_good_order()
    {
        Judge();
        _maker.Sequence = 500;
        _maker.Time = FrameMaker.Begin - 86_400;
        int refused = 0;
        StreamVerdict verdict = Judge();
        for (; verdict.Refusal is not null; verdict = Judge())
        {
            Assert.Equal(RefusalReason.TimeBackwards, verdict.Refusal.Reason);
            refused++;
        }

        Assert.Equal(StreamGuard.RunFrames - 1, refused);
        Assert.Equal(StreamBegin.ClockSetBack, verdict.Begins);
        Assert.True(verdict.Restart);
    }

    [Theory]
    [InlineData(0, RefusalReason.OutOfRange)]
    [InlineData(-1, RefusalReason.OutOfRange)]
    [InlineData(double.NaN, RefusalReason.OutOfRange)]
    [InlineData(double.PositiveInfinity, RefusalReason.OutOfRange)]
    public void An_interval_that_is_none_is_refused(double interval, RefusalReason reason)
    {
        _maker.Interval = interval;
        Assert.Equal(reason, _guard.Judge(_maker.Frame(_maker.Data())).Refusal?.Reason);
    }

    [Theory]
    [InlineData(-0.1)]
    [InlineData(1)]
    [InlineData(double.NaN)]
    public void An_overlap_outside_0_to_1_is_refused(double overlap)
    {
        _maker.Overlap = overlap;
        Assert.Equal(RefusalReason.OutOfRange, Judge().Refusal?.Reason);
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(-1)]
    [InlineData(1e18)]
    public void A_time_outside_the_calendar_is_refused(double time)
    {
        _maker.Time = time;
        Assert.Equal(RefusalReason.OutOfRange, Judge().Refusal?.Reason);
    }

    [Theory]
    [InlineData(100, 100, 200)]
    [InlineData(100, 300, 200)]
    [InlineData(-5, 100, 200)]
    [InlineData(100, double.NaN, 200)]
    public void Bins_that_do_not_ascend_are_refused(double a, double b, double c)
    {
        _maker.Frequencies = [a, b, c];
        Assert.Equal(RefusalReason.OutOfRange, Judge().Refusal?.Reason);
    }

    [Fact]
    public void Wrong_channel_count_and_wrong_shape_are_refused_with_both_numbers()
    {
        float[] data = _maker.Data();
        _maker.Channels = 5;
        Refusal? count = _guard.Judge(_maker.Frame(data)).Refusal;
        Assert.Equal(RefusalReason.WrongChannelCount, count?.Reason);
        Assert.Contains("5 channels, the array has 4", count?.Detail, StringComparison.Ordinal);
        _maker.Channels = 4;
        Assert.Equal(RefusalReason.WrongShape, _guard.Judge(_maker.Frame(data[..^2])).Refusal?.Reason);
    }

    private StreamVerdict Judge()
    {
        StreamVerdict verdict = _guard.Judge(_maker.Frame(_maker.Data()));
        _maker.Step();
        return verdict;
    }
}
