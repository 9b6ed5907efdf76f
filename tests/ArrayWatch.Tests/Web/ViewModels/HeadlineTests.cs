using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Tests.Web.Sample;
using ArrayWatch.Web.ViewModels;

namespace ArrayWatch.Tests.Web.ViewModels;

public sealed class HeadlineTests
{
    private static readonly DateTimeOffset _now = new(2026, 5, 1, 4, 14, 2, TimeSpan.Zero);

    [Fact]
    public void A_swap_is_told_in_one_sentence_with_both_labels()
    {
        Headline headline = Of(SampleArrays.FaultyLine(_now));

        Assert.Equal(HeadlineTone.Fault, headline.Tone);
        Assert.Equal("2 channels faulty: H12 and H18 carry each other's data", headline.Text);
        Assert.Equal("27 of 32 trusted, 1 suspect, 1 cannot be judged, 1 out of service", headline.Detail);
    }

    [Fact]
    public void All_trusted_is_said_only_when_every_channel_is()
    {
        Assert.Equal("All 16 channels trusted", Of(SampleArrays.HealthyPlane()).Text);

        SampleArray one = SampleArrays.HealthyPlane() with { Standings = new Dictionary<int, Standing> { [3] = Standing.Unknown } };

        Assert.Equal("15 of 16 channels trusted", Of(one).Text);
    }

    [Theory]
    [InlineData("waiting", HeadlineTone.NoData, "No data yet")]
    [InlineData("silent", HeadlineTone.NoData, "Data stopped 14 min ago")]
    [InlineData("starting", HeadlineTone.NoData, "Starting: too few data to judge yet")]
    [InlineData("field-not-understood", HeadlineTone.Attention, "Noise field not understood just now")]
    public void What_cannot_be_judged_is_never_called_good(string standing, HeadlineTone tone, string text)
    {
        Headline headline = Of(SampleArrays.HealthyPlane() with { Standing = standing, Age = TimeSpan.FromMinutes(14) });

        Assert.Equal((tone, text), (headline.Tone, headline.Text));
    }

    [Fact]
    public void A_shelved_alert_does_not_make_the_headline_but_its_faulty_channels_do()
    {
        SampleArray array = SampleArrays.FaultyLine(_now);
        Headline headline = Headline.Of(array.Overview(_now, 1), [SampleArrays.Swap(_now) with { State = AlertState.Shelved }], _now);

        Assert.Equal("2 channels faulty", headline.Text);
    }

    [Fact]
    public void The_fleet_names_its_only_faulty_array_and_counts_several()
    {
        Headline good = new(HeadlineTone.Good, "All 16 channels trusted", ""), bad = new(HeadlineTone.Fault, "1 channel faulty", ""), none = new(HeadlineTone.NoData, "No data yet", "");

        Assert.Equal("All 2 arrays in order", FleetHeadline.Of([("a", good), ("b", good)]).Text);
        Assert.Equal("b: 1 channel faulty", FleetHeadline.Of([("a", good), ("b", bad)]).Text);
        Assert.Equal("2 of 3 arrays with faults: b, c", FleetHeadline.Of([("a", good), ("b", bad), ("c", bad)]).Text);
        Assert.Equal(HeadlineTone.NoData, FleetHeadline.Of([("a", good), ("b", none)]).Tone);
    }

    private static Headline Of(SampleArray array) => Headline.Of(array.Overview(_now, array.Alerts.Count), array.Alerts, _now);
}
