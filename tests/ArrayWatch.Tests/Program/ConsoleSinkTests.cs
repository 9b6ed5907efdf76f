using ArrayWatch.Demo;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Tests.Programs;

public sealed class ConsoleSinkTests
{
    private static readonly DateTimeOffset _start = new(2026, 5, 1, 4, 0, 0, TimeSpan.Zero);

    [Fact]
    public async Task An_alert_is_one_line_with_times_since_the_start()
    {
        Assert.Equal(
            " 0:55  ALERT    plover  dead of H7, high priority, since 0:30 (levelDecibels -31.5). Leave H7 out.\n",
            await TellAsync(Alert(AlertState.Unacknowledged)));
    }

    [Fact]
    public async Task A_return_is_told_and_what_people_did_themselves_is_not()
    {
        Assert.Equal(" 1:40  good     plover  dead of H7 is over\n", await TellAsync(Alert(AlertState.ReturnedUnacknowledged) with { Returned = _start.AddSeconds(100) }));
        Assert.Empty(await TellAsync(Alert(AlertState.Acknowledged)));
    }

    private static async Task<string> TellAsync(AlertEvent alert)
    {
        using StringWriter console = new() { NewLine = "\n" };
        DemoClock clock = new();
        clock.Start(_start);
        await new ConsoleSink(clock, console).WriteAsync(new AlertOutput(alert.Array, alert.Changed, alert), TestContext.Current.CancellationToken);
        return console.ToString();
    }

    private static AlertEvent Alert(AlertState state) => new()
    {
        Id = "01J", Array = "plover", Kind = "dead", State = state, Priority = AlertPriority.High, Channels = ["H7"], Indices = [6],
        Onset = _start.AddSeconds(30), Raised = _start.AddSeconds(55), Changed = _start.AddSeconds(55),
        Estimate = new Dictionary<string, object> { ["levelDecibels"] = -31.5 }, Confidence = 0.999, Advice = "Leave H7 out.",
    };
}
