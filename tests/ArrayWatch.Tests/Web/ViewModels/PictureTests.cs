using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;
using ArrayWatch.Tests.Web.Sample;
using ArrayWatch.Web.Charts;
using ArrayWatch.Web.ViewModels;

namespace ArrayWatch.Tests.Web.ViewModels;

public sealed class PictureTests
{
    private static readonly DateTimeOffset _now = new(2026, 5, 1, 4, 14, 2, TimeSpan.Zero);

    [Fact]
    public void A_small_matrix_is_sent_as_it_is()
    {
        MatrixPicture picture = MatrixPicture.Of([1, 0.25f, 0.25f, 1], ["a", "b"], isPhase: false)!;

        Assert.Equal(1, picture.Block);
        Assert.Equal([[1, 0.25], [0.25, 1]], picture.Rows);
    }

    [Fact]
    public void A_matrix_of_512_channels_is_sent_in_blocks_and_one_wrong_pair_still_shows()
    {
        const int n = 512;
        float[] values = new float[n * n];
        for (int i = 0; i < n; i++) values[(i * n) + i] = 1;
        values[(301 * n) + 77] = 0.9f;

        MatrixPicture picture = MatrixPicture.Of(values, [.. Enumerable.Range(0, n).Select(static i => $"{i}")], isPhase: false)!;

        Assert.Equal(4, picture.Block);
        Assert.Equal(128, picture.Rows.Length);
        Assert.Equal(0.9, picture.Rows[301 / 4][77 / 4], 6);
        Assert.Equal(0, picture.Rows[0][0]);
        Assert.Equal("4", picture.Labels[1]);
    }

    [Fact]
    public void A_matrix_without_values_has_no_picture() => Assert.Null(MatrixPicture.Of([], ["a", "b"], isPhase: true));

    [Fact]
    public void Pairs_of_faulty_channels_stand_apart_and_the_number_of_points_is_bounded()
    {
        SampleArray large = SampleArrays.LargePlane();
        string[] labels = [.. large.Geometry.Channels.Select(static c => c.Label)];

        SeparationView view = SeparationView.Of(large.Coherence(500, "fast", _now)!, labels, static i => i == 3);

        Assert.InRange(view.Pairs.Count + view.Marked.Count, 2000, SeparationView.Largest);
        Assert.NotEmpty(view.Marked);
        Assert.All(view.Marked, static p => Assert.Contains("F4", p.Text.Split(" – ")));
        Assert.NotEmpty(view.Model);
    }

    [Fact]
    public void A_line_is_drawn_along_the_page_whatever_axis_it_lies_on()
    {
        GeometryView view = GeometryView.Of(ArrayGeometry.UniformLine(8, 1, new Position(0, 0, 1)), []);

        Assert.Equal("z", view.Horizontal);
        Assert.Equal(7, (view.Marks[^1].X - view.Marks[0].X) / (view.Marks[1].X - view.Marks[0].X), 9);
        Assert.Equal(1, view.ScaleMetres);
    }

    [Fact]
    public void A_plane_keeps_its_proportions_and_a_volume_states_the_depth_that_is_not_drawn()
    {
        GeometryView view = GeometryView.Of(SampleArrays.SilentVolume().Geometry, []);
        double across = view.Marks[1].X - view.Marks[0].X, up = view.Marks[0].Y - view.Marks[4].Y;

        Assert.Equal(("x", "y"), (view.Horizontal, view.Vertical));
        Assert.Equal(1, across / up, 9);
        Assert.Equal(1.6, view.DepthMetres, 9);
    }

    [Theory]
    [InlineData(4.65, 2)]
    [InlineData(0.09, 0.05)]
    [InlineData(120, 100)]
    public void A_scale_bar_has_a_round_length(double length, double round) => Assert.Equal(round, GeometryView.RoundLength(length), 12);

    [Fact]
    public void A_trend_picture_keeps_gaps_and_the_largest_deviation()
    {
        TrendGrid grid = new([_now, _now.AddSeconds(10)], [.. Enumerable.Range(0, 256).Select(static c => new[] { c == 7 ? -9.0 : 0.1, double.NaN })]);

        TrendGridView view = TrendGridView.Of(grid, [.. Enumerable.Range(0, 256).Select(static i => $"{i}")], isDeviation: true)!;

        Assert.Equal(128, view.Rows.Length);
        Assert.Equal(-9, view.Rows[3][0]);
        Assert.Equal(double.NaN, view.Rows[3][1]);
        Assert.InRange(view.Limit, 1, 9);
    }

    [Fact]
    public void A_trend_without_any_value_has_no_picture()
    {
        Assert.Null(TrendGridView.Of(new TrendGrid([_now], [[double.NaN]]), ["a"], isDeviation: true));
        Assert.Null(TrendCharts.Line(new TrendSeries([_now], [double.NaN], [double.NaN], [double.NaN]), TrendMetric.Known[0], "a"));
    }

    [Fact]
    public void Charts_send_a_gap_for_what_is_not_a_number()
    {
        ChartSpec spec = TrendCharts.Line(new TrendSeries([_now, _now], [1, double.NaN], [1, double.NaN], [1, double.NaN]), TrendMetric.Known[0], "H1")!;

        var line = Assert.IsType<Plotly.Blazor.Traces.Scatter>(ChartTraces.Traces(spec)[^1]);

        Assert.Equal([1.0, null!], line.Y);
    }

    [Fact]
    public void The_channel_table_puts_what_needs_a_person_first()
    {
        SampleArray array = SampleArrays.FaultyLine(_now);

        IReadOnlyList<ChannelRow> rows = ChannelRow.Of(array.Geometry, array.Health(_now, []), byIndex: false);

        Assert.Equal(["H12", "H18", "H24", "H4", "H31", "H1"], rows.Take(6).Select(static r => r.Label));
        Assert.Equal("cannot tell", rows[3].Gain);
        Assert.Equal("H1", ChannelRow.Of(array.Geometry, null, byIndex: true)[0].Label);
    }

    [Fact]
    public void Corrections_list_only_channels_that_need_something()
    {
        IReadOnlyList<CorrectionRow> rows = CorrectionRow.Of(SampleArrays.FaultyLine(_now).Corrections(_now));

        Assert.Equal(
            [new CorrectionRow("H12", "use its data as H18", ""), new("H18", "use its data as H12", ""), new("H24", "multiply by the factor", "+3.4 dB, 0.0°")],
            rows);
    }

    [Fact]
    public void The_gain_table_counts_what_is_lost()
    {
        BeamRow row = BeamRow.Of([new BeamReport("ahead", 0, 0, "adaptive", 18.7, 11.2, 18.6)])[0];

        Assert.Equal(("18.7", "11.2", "18.6"), (row.Healthy, row.Found, row.Corrected));
        Assert.Equal(7.5, row.Lost, 9);
    }

    [Fact]
    public void Alerts_that_wait_come_first_and_the_live_state_beats_the_stored_one()
    {
        AlertEvent old = SampleArrays.Phase(_now) with { State = AlertState.Acknowledged }, swap = SampleArrays.Swap(_now);

        IReadOnlyList<AlertEvent> merged = AlertList.Merge([swap, old], [swap with { State = AlertState.Normal }], urgentFirst: true);

        Assert.Equal([swap.Id, old.Id], merged.Select(static a => a.Id));
        Assert.Equal(AlertState.Unacknowledged, merged[0].State);
        Assert.Equal([old.Id, swap.Id], AlertList.Merge([swap, old], [], urgentFirst: false).Select(static a => a.Id));
    }
}
