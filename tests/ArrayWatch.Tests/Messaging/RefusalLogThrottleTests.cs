using ArrayWatch.Messaging.Inbound;
using Microsoft.Extensions.Time.Testing;

namespace ArrayWatch.Tests.Messaging;

public sealed class RefusalLogThrottleTests
{
    [Fact]
    public void Lets_one_a_minute_through_and_counts_the_others()
    {
        FakeTimeProvider time = new();
        RefusalLogThrottle throttle = new(time);

        Assert.True(throttle.Admit(out long heldBack));
        Assert.Equal(0, heldBack);
        for (int i = 1; i <= 5; i++)
        {
            time.Advance(TimeSpan.FromSeconds(10));
            Assert.False(throttle.Admit(out heldBack));
            Assert.Equal(i, heldBack);
        }
        time.Advance(TimeSpan.FromSeconds(10));
        Assert.True(throttle.Admit(out heldBack));
        Assert.Equal(5, heldBack);
        Assert.False(throttle.Admit(out heldBack));
        Assert.Equal(1, heldBack);
    }
}
