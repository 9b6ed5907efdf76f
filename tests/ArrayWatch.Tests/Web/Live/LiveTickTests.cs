using ArrayWatch.Tests.Web.Sample;
using ArrayWatch.Web.Live;
using Microsoft.Extensions.Logging.Abstractions;
using Microsoft.Extensions.Time.Testing;

namespace ArrayWatch.Tests.Web.Live;

public sealed class LiveTickTests
{
    private readonly FakeTimeProvider _time = new();

    [Fact]
    public async Task Listeners_hear_every_second_and_whether_the_fleet_changed()
    {
        SampleFleet fleet = new(_time, new SampleHistory(16), SampleArrays.HealthyPlane());
        await using LiveTick tick = new(fleet, _time, NullLogger<LiveTick>.Instance);
        TaskCompletionSource<bool> heard = new(TaskCreationOptions.RunContinuationsAsynchronously);
        using IDisposable subscription = tick.Listen(changed =>
        {
            heard.TrySetResult(changed);
            return Task.CompletedTask;
        });

        fleet.Raise(SampleArrays.Phase(_time.GetUtcNow()));
        _time.Advance(TimeSpan.FromSeconds(1));
        Assert.True(await heard.Task);

        heard = new(TaskCreationOptions.RunContinuationsAsynchronously);
        _time.Advance(TimeSpan.FromSeconds(1));
        Assert.False(await heard.Task);
    }

    [Fact]
    public async Task A_listener_that_fails_does_not_silence_the_others()
    {
        await using LiveTick tick = new(new SampleFleet(_time, new SampleHistory(16)), _time, NullLogger<LiveTick>.Instance);
        TaskCompletionSource heard = new(TaskCreationOptions.RunContinuationsAsynchronously);
        using IDisposable first = tick.Listen(static _ => throw new NotSupportedException("broken part"));
        using IDisposable second = tick.Listen(_ =>
        {
            heard.TrySetResult();
            return Task.CompletedTask;
        });

        _time.Advance(TimeSpan.FromSeconds(1));

        await heard.Task;
    }

    [Fact]
    public async Task Disposal_waits_for_the_loop_and_ends_it()
    {
        LiveTick tick = new(new SampleFleet(_time, new SampleHistory(16)), _time, NullLogger<LiveTick>.Instance);
        using IDisposable subscription = tick.Listen(static _ => Task.CompletedTask);

        await tick.DisposeAsync();
        await tick.DisposeAsync();

        Assert.Throws<ObjectDisposedException>(() => tick.Listen(static _ => Task.CompletedTask));
    }
}
