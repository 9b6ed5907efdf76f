using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;
using ArrayWatch.Storage;
using Microsoft.Extensions.Logging.Abstractions;

namespace ArrayWatch.Tests.Storage;

public sealed class MetricStoreTests : IDisposable
{
    private static readonly DateTimeOffset Start = new(2026, 5, 1, 0, 0, 0, TimeSpan.Zero);
    private static readonly CancellationToken None = CancellationToken.None;
    private readonly string _folder = Directory.CreateTempSubdirectory("arraywatch-store-").FullName;

    private string FilePath => Path.Combine(_folder, "new", "store.db");

    public void Dispose()
    {
        Microsoft.Data.Sqlite.SqliteConnection.ClearAllPools();
        Directory.Delete(_folder, recursive: true);
    }

    [Fact]
    public async Task A_trend_gives_the_mean_minimum_and_maximum_of_what_was_written()
    {
        await using MetricStore store = Open();
        await Write(store, 0, 360);
        TrendSeries day = await store.TrendAsync("aft", "levelDecibels", 1, Start, Start.AddHours(1), 6, None);
        Assert.Equal(6, day.Mean.Length);
        for (int p = 0; p < 6; p++)
        {
            // Channel 1 holds 100 + k at sample k, ten seconds apart: sixty samples to a point.
            Assert.Equal(100 + (60 * p) + 29.5, day.Mean[p], 3);
            Assert.Equal(100 + (60 * p), day.Minimum[p], 3);
            Assert.Equal(100 + (60 * p) + 59, day.Maximum[p], 3);
        }

        TrendSeries field = await store.TrendAsync("aft", "misfit", null, Start, Start.AddHours(1), 2, None);
        Assert.Equal(0.25, field.Mean[0], 6);
    }

    [Fact]
    public async Task Writing_the_same_again_changes_nothing()
    {
        await using MetricStore store = Open();
        await Write(store, 0, 100);
        double[] once = (await store.TrendAsync("aft", "levelDecibels", 0, Start, Start.AddHours(1), 4, None)).Mean;
        await Write(store, 0, 100);
        Assert.Equal(once, (await store.TrendAsync("aft", "levelDecibels", 0, Start, Start.AddHours(1), 4, None)).Mean);
    }

    [Fact]
    public async Task What_was_committed_is_there_after_reopening()
    {
        await using (MetricStore store = Open()) await Write(store, 0, 10);
        await using MetricStore again = Open();
        TrendGrid grid = await again.TrendGridAsync("aft", "levelDecibels", Start, Start.AddSeconds(100), 2, None);
        Assert.Equal(2, grid.Values.Length);
        Assert.Equal(104.5 - 2.5, grid.Values[1][0], 3);
    }

    [Fact]
    public async Task An_older_change_of_an_alert_does_not_take_the_place_of_a_newer_one()
    {
        await using MetricStore store = Open();
        AlertEvent first = Alert(AlertState.Unacknowledged, 10), second = Alert(AlertState.Normal, 20);
        await store.WriteAsync(new AlertOutput("aft", first.Changed, first), None);
        await store.WriteAsync(new AlertOutput("aft", second.Changed, second), None);
        await store.WriteAsync(new AlertOutput("aft", first.Changed, first), None);
        await store.FlushAsync(None);
        AlertEvent kept = Assert.Single(await store.AlertsAsync("aft", null, null, null, 10, None));
        Assert.Equal(AlertState.Normal, kept.State);
        Assert.Equal(2, (await store.AlertHistoryAsync(first.Id, None)).Count);
        Assert.Empty(await store.OpenAlertsAsync("aft", None));
    }

    [Fact]
    public async Task The_audit_log_keeps_who_and_why()
    {
        await using MetricStore store = Open();
        await store.AuditAsync(new AuditEntry("01A", Start, "acknowledge", "mate", "seen", null), None);
        AuditEntry kept = Assert.Single(await store.AuditLogAsync("01A", None));
        Assert.Equal(("mate", "seen"), (kept.Who, kept.Why));
    }

    [Fact]
    public async Task A_picture_comes_back_within_its_steps()
    {
        await using MetricStore store = Open();
        CoherencePicture picture = new()
        {
            Time = Start, Frequency = 100, Scale = "fast", Channels = 2, Magnitude = [1, 0.7f, 0.7f, 1], PhaseDegrees = [0, 33, -33, 0],
            ModelMagnitude = [], ModelPhaseDegrees = [], SeparationMetres = [0, 1.5f, 1.5f, 0],
        };
        await store.WriteAsync(new CoherenceOutput("aft", Start, picture), None);
        await store.FlushAsync(None);
        CoherenceEntry entry = Assert.Single(await store.CoherenceEntriesAsync("aft", Start.AddHours(-1), Start.AddHours(1), None));
        CoherencePicture kept = (await store.CoherenceAsync("aft", entry.Entry, None))!;
        Assert.Equal(0.7, kept.Magnitude[1], 0.003);
        Assert.Equal(33, kept.PhaseDegrees[1], 1.0);
        Assert.Equal(-33, kept.PhaseDegrees[2], 1.0);
    }

    [Fact]
    public async Task What_is_older_than_the_retention_goes()
    {
        await using MetricStore store = Open(retentionDays: 1);
        await Write(store, 0, 10);
        await Write(store, 2 * 8640, 400);
        TrendSeries old = await store.TrendAsync("aft", "levelDecibels", 0, Start, Start.AddHours(1), 2, None);
        Assert.All(old.Mean, v => Assert.True(double.IsNaN(v)));
    }

    [Fact]
    public async Task A_channel_list_that_changes_within_the_hour_keeps_what_both_saw()
    {
        await using (MetricStore store = Open()) await Write(store, 0, 180);
        MetricStore changed = new(
            new StoreOptions(FilePath), [new ArrayDefinition { Id = "aft", Geometry = ArrayGeometry.UniformLine(3, 1, new Position(1, 0, 0), "H"), Medium = new Medium.Given(1500) }],
            TimeProvider.System, NullLogger<MetricStore>.Instance);
        await using (changed)
        {
            await changed.WriteAsync(new MetricsOutput("aft", Start.AddSeconds(1800), new MetricSet(
                new Dictionary<string, float[]> { ["levelDecibels"] = [180, 280, 5] }, new Dictionary<string, double>())), None);
            await changed.FlushAsync(None);
            TrendSeries hours = await changed.TrendAsync("aft", "levelDecibels", 0, Start, Start.AddHours(2), 2, None);
            Assert.Equal(90, hours.Mean[0], 3);
            Assert.Equal(0, hours.Minimum[0], 3);
            Assert.Equal(180, hours.Maximum[0], 3);
        }
    }

    [Fact]
    public async Task A_year_of_sixty_four_channels_stays_under_two_gigabytes()
    {
        // Steady state by levels, from four hours written at ten-second steps: bytes a row, times rows kept. Pictures: the worst case,
        // 64 channels of noise at every ten minutes (2080 pairs of four bytes and a half-precision separation, incompressible).
        const int Samples = 1440, Channels = 64;
        Random random = new(1);
        string[] metrics = ["levelDecibels", "gainDecibels", "phaseDegrees", "delayMicroseconds", "excessDecibels"];
        MetricStore store = new(
            new StoreOptions(FilePath), [new ArrayDefinition { Id = "aft", Geometry = ArrayGeometry.UniformLine(Channels, 1, new Position(1, 0, 0), "H"), Medium = new Medium.Given(1500) }],
            TimeProvider.System, NullLogger<MetricStore>.Instance);
        await using (store)
        {
            for (int k = 0; k < Samples; k++)
            {
                await store.WriteAsync(new MetricsOutput("aft", Start.AddSeconds(10 * k), new MetricSet(
                    metrics.ToDictionary(m => m, _ => Enumerable.Range(0, Channels).Select(_ => (float)random.NextDouble()).ToArray()),
                    Enumerable.Range(0, 9).ToDictionary(i => $"field{i}", _ => random.NextDouble()))), None);
            }

            await store.FlushAsync(None);
        }

        using Microsoft.Data.Sqlite.SqliteConnection c = new($"Data Source={FilePath}");
        c.Open();
        double PagesOf(string condition)
        {
            // The level alone in a file of its own, packed as it would lie, with its index.
            using Microsoft.Data.Sqlite.SqliteCommand k = c.CreateCommand();
#pragma warning disable CA2100 // The conditions are constants of this test.
            k.CommandText = $"""
                ATTACH ':memory:' AS level; CREATE TABLE level.metric AS SELECT * FROM metric WHERE {condition};
                CREATE UNIQUE INDEX level.place ON metric (array, name, seconds, time, layout);
                """;
#pragma warning restore CA2100
            k.ExecuteNonQuery();
            k.CommandText = "PRAGMA level.page_count";
            double bytes = 4096.0 * (long)k.ExecuteScalar()!;
            k.CommandText = "DETACH level";
            k.ExecuteNonQuery();
            return bytes;
        }

        double PerHour(string seconds) => PagesOf("seconds=" + seconds) / 4;
        double year = (PerHour("0") * 48) + (PerHour("60") * 24 * 14) + (PerHour("600") * 8760) + (PerHour("3600") * 8760);
        double pictures = 8760.0 * 6 * 2080 * 6;
        Assert.InRange(year + pictures, 0, 2e9);
    }

    [Fact]
    public void A_file_that_is_no_store_is_refused_in_one_line()
    {
        string path = Path.Combine(_folder, "broken.db");
        File.WriteAllText(path, new string('x', 8192));
        StoreUnavailableException e = Assert.Throws<StoreUnavailableException>(() => Open(path: path));
        Assert.Contains("broken.db", e.Message, StringComparison.Ordinal);
        Assert.DoesNotContain('\n', e.Message);
    }

    private MetricStore Open(int retentionDays = 400, string? path = null) => new(
        new StoreOptions(path ?? FilePath, retentionDays),
        [new ArrayDefinition { Id = "aft", Geometry = ArrayGeometry.UniformLine(2, 1, new Position(1, 0, 0), "H"), Medium = new Medium.Given(1500) }],
        TimeProvider.System, NullLogger<MetricStore>.Instance);

    private static async Task Write(MetricStore store, int first, int count)
    {
        for (int k = first; k < first + count; k++)
        {
            DateTimeOffset time = Start.AddSeconds(10 * k);
            await store.WriteAsync(new MetricsOutput("aft", time, new MetricSet(
                new Dictionary<string, float[]> { ["levelDecibels"] = [k, 100 + k] }, new Dictionary<string, double> { ["misfit"] = 0.25 })), None);
        }

        await store.FlushAsync(None);
    }

    private static AlertEvent Alert(AlertState state, int seconds) => new()
    {
        Id = "01ALERT", Array = "aft", Kind = "dead", State = state, Priority = AlertPriority.High, Channels = ["H1"], Indices = [0],
        Onset = Start, Raised = Start, Changed = Start.AddSeconds(seconds), Estimate = new Dictionary<string, object>(), Confidence = 1, Advice = "leave it out",
    };
}
