using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Alerts;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Tests.Monitoring;

public sealed class AlertBookTests
{
    private static readonly DateTimeOffset Now = new(2026, 5, 1, 4, 0, 0, TimeSpan.Zero);
    private readonly BookDriver _book = new();

    [Fact]
    public void A_fault_is_raised_once_and_returns_once()
    {
        AlertEvent raised = Assert.Single(_book.At(0, "dead:1"));
        Assert.Equal(AlertState.Unacknowledged, raised.State);
        Assert.Equal(["H2"], raised.Channels);
        Assert.Empty(_book.At(10, "dead:1"));
        AlertEvent returned = Assert.Single(_book.At(20));
        Assert.Equal(AlertState.ReturnedUnacknowledged, returned.State);
        Assert.Equal(raised.Id, returned.Id);
        Assert.NotNull(returned.Returned);
        Assert.Empty(_book.At(30));
    }

    [Fact]
    public void A_fault_that_returns_unseen_and_comes_again_goes_on_under_its_id()
    {
        AlertEvent raised = Assert.Single(_book.At(0, "dead:1"));
        _book.At(100);
        AlertEvent again = Assert.Single(_book.At(200, "dead:1"));
        Assert.Equal(raised.Id, again.Id);
        Assert.Equal(AlertState.Unacknowledged, again.State);
        Assert.Null(again.Returned);
    }

    [Fact]
    public void After_normal_it_is_a_new_alert_with_a_later_id()
    {
        AlertEvent raised = Assert.Single(_book.At(0, "dead:1"));
        _book.Act(raised.Id, AlertVerb.Acknowledge);
        Assert.Equal(AlertState.Normal, Assert.Single(_book.At(100)).State);
        Assert.Empty(_book.Book.Open);
        AlertEvent anew = Assert.Single(_book.At(900, "dead:1"));
        Assert.True(string.CompareOrdinal(anew.Id, raised.Id) > 0);
    }

    [Fact]
    public void Ids_follow_from_the_fault_and_the_time_alone()
    {
        Assert.Equal(Assert.Single(_book.At(0, "dead:1")).Id, Assert.Single(new BookDriver().At(0, "dead:1")).Id);
        Assert.NotEqual(Assert.Single(new BookDriver().At(0, "gain:1")).Id, Assert.Single(new BookDriver().At(0, "dead:1")).Id);
    }

    public static TheoryData<AlertState, AlertVerb, AlertState?> Table => new()
    {
        { AlertState.Unacknowledged, AlertVerb.Acknowledge, AlertState.Acknowledged },
        { AlertState.Unacknowledged, AlertVerb.Shelve, AlertState.Shelved },
        { AlertState.Unacknowledged, AlertVerb.Unshelve, null },
        { AlertState.Unacknowledged, AlertVerb.OutOfService, AlertState.OutOfService },
        { AlertState.Acknowledged, AlertVerb.Acknowledge, null },
        { AlertState.Acknowledged, AlertVerb.Shelve, AlertState.Shelved },
        { AlertState.Acknowledged, AlertVerb.Unshelve, null },
        { AlertState.Acknowledged, AlertVerb.OutOfService, AlertState.OutOfService },
        { AlertState.ReturnedUnacknowledged, AlertVerb.Acknowledge, AlertState.Normal },
        { AlertState.ReturnedUnacknowledged, AlertVerb.Shelve, AlertState.Shelved },
        { AlertState.ReturnedUnacknowledged, AlertVerb.Unshelve, null },
        { AlertState.ReturnedUnacknowledged, AlertVerb.OutOfService, AlertState.OutOfService },
        { AlertState.Shelved, AlertVerb.Acknowledge, null },
        { AlertState.Shelved, AlertVerb.Shelve, AlertState.Shelved },
        { AlertState.Shelved, AlertVerb.Unshelve, AlertState.Unacknowledged },
        { AlertState.Shelved, AlertVerb.OutOfService, AlertState.OutOfService },
        { AlertState.SuppressedByDesign, AlertVerb.Acknowledge, null },
        { AlertState.SuppressedByDesign, AlertVerb.Shelve, null },
        { AlertState.SuppressedByDesign, AlertVerb.Unshelve, null },
        { AlertState.SuppressedByDesign, AlertVerb.OutOfService, AlertState.OutOfService },
        { AlertState.OutOfService, AlertVerb.Acknowledge, null },
        { AlertState.OutOfService, AlertVerb.Shelve, null },
        { AlertState.OutOfService, AlertVerb.Unshelve, null },
        { AlertState.OutOfService, AlertVerb.OutOfService, AlertState.Unacknowledged },
    };

    [Theory]
    [MemberData(nameof(Table))]
    public void Each_action_in_each_state_leads_where_the_standard_says_or_is_refused_with_a_reason(AlertState from, AlertVerb verb, AlertState? to)
    {
        string id = _book.BringTo(from);
        if (to is { } state)
        {
            Assert.Equal(state, _book.Act(id, verb).State);
            Assert.Equal(state != AlertState.Normal, _book.Book.Open.Any(a => a.Id == id));
            return;
        }

        InvalidOperationException refused = Assert.Throws<InvalidOperationException>(() => _book.Act(id, verb));
        Assert.StartsWith("not possible: ", refused.Message, StringComparison.Ordinal);
        Assert.Equal(from, _book.Book.Open.Single(a => a.Id == id).State);
    }

    [Theory]
    [InlineData(AlertState.Unacknowledged, AlertState.ReturnedUnacknowledged)]
    [InlineData(AlertState.Acknowledged, AlertState.Normal)]
    [InlineData(AlertState.Shelved, AlertState.Shelved)]
    [InlineData(AlertState.SuppressedByDesign, AlertState.Normal)]
    [InlineData(AlertState.OutOfService, AlertState.OutOfService)]
    public void When_the_fault_goes_each_state_leads_where_the_standard_says(AlertState from, AlertState to)
    {
        string id = _book.BringTo(from);
        AlertEvent[] told = [.. _book.At(1000, from == AlertState.SuppressedByDesign ? ["dead:0,1:G1"] : [])];
        AlertState now = told.FirstOrDefault(a => a.Id == id)?.State ?? _book.Book.Open.Single(a => a.Id == id).State;
        Assert.Equal(to, now);
    }

    [Fact]
    public void Shelving_needs_an_end_within_a_week()
    {
        string id = _book.BringTo(AlertState.Unacknowledged);
        Assert.Throws<InvalidOperationException>(() => _book.Act(id, AlertVerb.Shelve, null));
        Assert.Throws<InvalidOperationException>(() => _book.Act(id, AlertVerb.Shelve, Now.AddMinutes(-1)));
        Assert.Throws<InvalidOperationException>(() => _book.Act(id, AlertVerb.Shelve, Now.AddDays(7).AddSeconds(1)));
        Assert.Equal(Now.AddDays(7), _book.Act(id, AlertVerb.Shelve, Now.AddDays(7)).Until);
    }

    [Fact]
    public void A_shelf_ends_by_itself_and_what_still_stands_is_announced_anew()
    {
        string id = _book.BringTo(AlertState.Shelved);
        Assert.Empty(_book.Book.Expire(BookDriver.Begin, Now.AddMinutes(59)));
        (AlertEvent alert, string done) = Assert.Single(_book.Book.Expire(BookDriver.Begin, Now.AddHours(1)));
        Assert.Equal((id, AlertState.Unacknowledged, "unshelve"), (alert.Id, alert.State, done));
        Assert.Null(alert.Until);
    }

    [Fact]
    public void What_goes_while_shelved_is_normal_when_the_shelf_ends()
    {
        _book.BringTo(AlertState.Shelved);
        _book.At(1000);
        Assert.Equal(AlertState.Normal, Assert.Single(_book.Book.Expire(BookDriver.Begin, Now.AddHours(1))).Alert.State);
        Assert.Empty(_book.Book.Open);
    }

    [Fact]
    public void Out_of_service_hands_over_the_channels_until_it_is_brought_back()
    {
        string id = _book.BringTo(AlertState.OutOfService);
        Assert.Equal([1], _book.Book.OutOfServiceChannels);
        _book.Act(id, AlertVerb.OutOfService);
        Assert.Empty(_book.Book.OutOfServiceChannels);
    }

    [Fact]
    public void A_groups_alert_holds_back_its_members_until_it_has_gone()
    {
        AlertEvent single = Assert.Single(_book.At(0, "dead:1"));
        AlertEvent[] told = [.. _book.At(10, "dead:1", "dead:0,1:G1")];
        Assert.Equal(2, told.Length);
        Assert.Equal(AlertState.SuppressedByDesign, told.Single(a => a.Id == single.Id).State);
        told = [.. _book.At(20, "dead:1")];
        Assert.Equal(AlertState.Unacknowledged, told.Single(a => a.Id == single.Id).State);
    }

    [Fact]
    public void A_member_with_a_fault_of_another_sort_is_not_held_back()
    {
        _book.At(0, "clock-drift:0,1:G1");
        Assert.Equal(AlertState.Unacknowledged, Assert.Single(_book.At(10, "clock-drift:0,1:G1", "polarity:1")).State);
    }

    // Window of 120 s here: three occurrences that cleared within it (common practice, no source).
    [Fact]
    public void What_comes_and_goes_three_times_within_the_window_is_held_and_says_why()
    {
        _book.At(0, "dead:1");
        _book.At(10);
        _book.At(20, "dead:1");
        _book.At(30);
        _book.At(40, "dead:1");
        AlertEvent held = Assert.Single(_book.At(50));
        Assert.Equal(AlertState.Unacknowledged, held.State);
        Assert.Contains("comes and goes", held.Reason, StringComparison.Ordinal);
        Assert.Empty(_book.At(60, "dead:1"));
        Assert.Empty(_book.At(70));
        Assert.Empty(_book.At(179));
        Assert.Equal(AlertState.ReturnedUnacknowledged, Assert.Single(_book.At(180)).State);
    }

    [Fact]
    public void What_comes_and_goes_slowly_is_not_held()
    {
        for (int i = 0; i < 5; i++)
        {
            Assert.Single(_book.At(80 * i, "dead:1"));
            Assert.Equal(AlertState.ReturnedUnacknowledged, Assert.Single(_book.At((80 * i) + 10)).State);
        }
    }

    [Fact]
    public void An_estimate_that_changes_is_told_again_at_most_every_five_minutes()
    {
        _book.At(0, "gain:1");
        _book.GainDecibels = -9;
        Assert.Empty(_book.At(299, "gain:1"));
        Assert.Equal(-9.0, Assert.Single(_book.At(300, "gain:1")).Estimate["gainDecibels"]);
        _book.GainDecibels = -9.5;
        Assert.Empty(_book.At(900, "gain:1"));
    }

    [Fact]
    public void A_restart_neither_repeats_nor_forgets()
    {
        AlertEvent raised = Assert.Single(_book.At(0, "dead:1"));
        BookDriver after = new();
        after.Book.Restore(_book.Book.Open);
        after.Ready = false;
        Assert.Empty(after.At(1000));
        after.Ready = true;
        Assert.Empty(after.At(1010));
        Assert.Empty(after.At(1020, "dead:1"));
        AlertEvent returned = Assert.Single(after.At(1030));
        Assert.Equal((raised.Id, raised.Onset), (returned.Id, returned.Onset));
    }

    [Theory]
    [InlineData(Standing.Trusted, 12)]
    [InlineData(Standing.Suspect, 60)]
    public void After_a_restart_a_fault_that_is_not_seen_returns_when_the_evidence_has_had_time(Standing standing, double seconds)
    {
        _book.At(0, "dead:1");
        BookDriver after = new() { Standing = standing };
        after.Book.Restore(_book.Book.Open);
        Assert.Empty(after.At(1000));
        Assert.Empty(after.At(1000 + seconds - 1));
        Assert.Equal(AlertState.ReturnedUnacknowledged, Assert.Single(after.At(1000 + seconds)).State);
    }

    [Theory]
    [InlineData(AlertState.Acknowledged)]
    [InlineData(AlertState.Shelved)]
    [InlineData(AlertState.OutOfService)]
    [InlineData(AlertState.SuppressedByDesign)]
    [InlineData(AlertState.ReturnedUnacknowledged)]
    public void A_restart_keeps_what_people_did(AlertState state)
    {
        string id = _book.BringTo(state);
        BookDriver after = new();
        after.Book.Restore(_book.Book.Open);
        after.At(1000);
        Assert.Equal(state, after.Book.Open.Single(a => a.Id == id).State);
    }

    [Fact]
    public void Lost_array_gain_raises_the_priority_by_a_step()
    {
        _book.Effect = new Dictionary<string, double> { ["conventional"] = 1.2, ["adaptive"] = 0.1 };
        Assert.Equal(AlertPriority.High, Assert.Single(_book.At(0, "dead:1")).Priority);
        Assert.Equal(AlertPriority.Medium, Assert.Single(new BookDriver().At(0, "dead:1")).Priority);
    }
}
