using System.Text.Json;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Tests.Web.Sample;
using ArrayWatch.Web.ViewModels;

namespace ArrayWatch.Tests.Web.ViewModels;

public sealed class TextTests
{
    private static readonly DateTimeOffset _now = new(2026, 5, 1, 4, 14, 2, TimeSpan.Zero);

    [Theory]
    [InlineData(0, "0 s")]
    [InlineData(59, "59 s")]
    [InlineData(250, "4 min 10 s")]
    [InlineData(3599, "59 min")]
    [InlineData(12_000, "3 h 20 min")]
    [InlineData(90_000, "1 day 1 h")]
    [InlineData(432_000, "5 days")]
    public void An_age_is_given_in_its_two_largest_units(int seconds, string text) => Assert.Equal(text, AgeText.Span(TimeSpan.FromSeconds(seconds)));

    [Fact]
    public void A_time_says_that_it_is_UTC_and_its_date_unless_it_is_today()
    {
        Assert.Equal("04:12:30 UTC", AgeText.Utc(new DateTimeOffset(2026, 5, 1, 6, 12, 30, TimeSpan.FromHours(2)), _now));
        Assert.Equal("30 Apr 2026 23:00:00 UTC", AgeText.Utc(new DateTimeOffset(2026, 4, 30, 23, 0, 0, TimeSpan.Zero), _now));
        Assert.Equal("never", AgeText.Ago(null, _now));
        Assert.Equal("in 1 h 0 min", AgeText.Ago(_now.AddHours(1), _now));
    }

    [Theory]
    [InlineData(-7.04, 0.21, "−7.04 ± 0.21")]
    [InlineData(3.2, 4.0, "+3.2 ± 4.0")]
    [InlineData(123.4, 25.0, "+123 ± 25")]
    [InlineData(-0.001, 0.11, "0.00 ± 0.11")]
    public void An_error_sets_the_decimals_of_its_value(double value, double error, string text) => Assert.Equal(text, NumberText.WithError(value, error, 2));

    [Fact]
    public void Nothing_known_is_said_in_words()
    {
        Assert.Equal("cannot tell", NumberText.WithError(null, null, 2));
        Assert.Equal("cannot tell", NumberText.WithError(double.NaN, 1, 2));
    }

    [Theory]
    [InlineData(0.9997, "99.97 %")]
    [InlineData(0.99999, "over 99.99 %")]
    [InlineData(0.8, "80 %")]
    public void Confidence_is_never_rounded_up_to_certainty(double probability, string text) => Assert.Equal(text, NumberText.Confidence(probability));

    [Fact]
    public void An_estimate_reads_the_same_fresh_and_from_the_store()
    {
        AlertEvent fresh = SampleArrays.Swap(_now);
        AlertEvent stored = JsonSerializer.Deserialize<AlertEvent>(ReportJson.Write(fresh), ReportJson.Options)!;
        string[] labels = [.. Enumerable.Range(1, 32).Select(i => $"H{i}")];

        Assert.Equal("H12 carries H18, H18 carries H12", Assert.Single(EstimateText.Lines(fresh.Estimate, labels)).Text);
        Assert.Equal(EstimateText.Lines(fresh.Estimate, labels), EstimateText.Lines(stored.Estimate, labels));
    }

    [Fact]
    public void An_estimate_takes_its_standard_error_with_it() =>
        Assert.Equal([new NamedText("phase", "+47.30 ± 0.80°")], EstimateText.Lines(SampleArrays.Phase(_now).Estimate, []));

    [Theory]
    [InlineData("dead", "H12 and H18: no signal")]
    [InlineData("gain", "H12 and H18: amplitude −7.0 dB")]
    [InlineData("delay", "H12 and H18: 200 µs early")]
    [InlineData("polarity", "H12 and H18: sign reversed")]
    [InlineData("stream", "Data stream disturbed or stopped")]
    [InlineData("something-new", "H12 and H18: something-new")]
    public void Each_kind_has_a_sentence(string kind, string sentence)
    {
        AlertEvent alert = SampleArrays.Swap(_now) with
        {
            Kind = kind,
            Estimate = new Dictionary<string, object> { ["gainDecibels"] = -7.0, ["delayMicroseconds"] = -200.0 },
        };

        Assert.Equal(sentence, AlertSentence.Of(alert));
    }

    [Fact]
    public void A_group_is_named_instead_of_its_channels() =>
        Assert.StartsWith("Group G3 (2 channels)", AlertSentence.Of(SampleArrays.Swap(_now) with { Kind = "dead", Group = "G3" }), StringComparison.Ordinal);
}
