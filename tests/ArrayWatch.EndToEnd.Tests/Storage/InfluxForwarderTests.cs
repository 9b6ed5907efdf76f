using System.Diagnostics;
using System.Net;
using System.Net.Sockets;
using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;
using ArrayWatch.Storage;
using Microsoft.Extensions.Logging.Abstractions;

namespace ArrayWatch.EndToEnd.Tests.Storage;

/// <summary>Copies sent on to a real server that takes InfluxDB 2 writes (Debian's victoria-metrics), and read back from it.</summary>
public sealed class InfluxForwarderTests : IDisposable
{
    private static readonly CancellationToken None = CancellationToken.None;
    private readonly string _folder = Directory.CreateTempSubdirectory("arraywatch-influx-").FullName;
    private readonly int _port = FreePort();
    private readonly HttpClient _http = new();
    private Process? _server;

    public void Dispose()
    {
        StopServer();
        _http.Dispose();
        Microsoft.Data.Sqlite.SqliteConnection.ClearAllPools();
        Directory.Delete(_folder, recursive: true);
    }

    [Fact]
    public async Task Hours_without_a_link_lose_nothing_and_repeat_nothing()
    {
        DateTimeOffset start = DateTimeOffset.UtcNow.AddMinutes(-30);
        start = start.AddTicks(-(start.Ticks % TimeSpan.TicksPerSecond));
        ArrayDefinition[] arrays = [new() { Id = "aft", Geometry = ArrayGeometry.UniformLine(2, 1, new Position(1, 0, 0), "H 1,"), Medium = new Medium.Given(1500) }];
        await using (MetricStore store = Open(arrays))
        {
            await Write(store, start, 0, 40);
            using InfluxForwarder away = Forwarder(store, arrays);
            await Assert.ThrowsAnyAsync<Exception>(() => away.ForwardAsync(None));
        }

        // The process ends and begins again between, and more comes while the server is still away.
        await using MetricStore again = Open(arrays);
        await Write(again, start, 40, 40);
        await StartServerAsync();
        using InfluxForwarder forwarder = Forwarder(again, arrays);
        while (await forwarder.ForwardAsync(None))
        {
        }

        Assert.False(await forwarder.ForwardAsync(None));
        string[] lines = [];
        for (int tries = 0; tries < 100 && lines.Length < 2; tries++)
        {
            await _http.GetStringAsync(new Uri($"http://127.0.0.1:{_port}/internal/force_flush"), None);
            string text = await _http.GetStringAsync(
                new Uri($"http://127.0.0.1:{_port}/api/v1/export?match[]=array_channel_levelDecibels&start={start.ToUnixTimeSeconds() - 60}"), None);
            lines = text.Split('\n', StringSplitOptions.RemoveEmptyEntries);
        }

        Assert.Equal(2, lines.Length);
        foreach (string line in lines)
        {
            using System.Text.Json.JsonDocument series = System.Text.Json.JsonDocument.Parse(line);
            Assert.Equal(80, series.RootElement.GetProperty("values").GetArrayLength());
            Assert.Equal("aft", series.RootElement.GetProperty("metric").GetProperty("array").GetString());
            Assert.StartsWith("H 1,", series.RootElement.GetProperty("metric").GetProperty("channel").GetString(), StringComparison.Ordinal);
        }
    }

    private static int FreePort()
    {
        using TcpListener listener = new(IPAddress.Loopback, 0);
        listener.Start();
        return ((IPEndPoint)listener.LocalEndpoint).Port;
    }

    private MetricStore Open(ArrayDefinition[] arrays) => new(
        new StoreOptions(Path.Combine(_folder, "store.db"), 400, KeepsOutbox: true), arrays, TimeProvider.System, NullLogger<MetricStore>.Instance);

    private InfluxForwarder Forwarder(MetricStore store, ArrayDefinition[] arrays) => new(
        store, new InfluxOptions(new Uri($"http://127.0.0.1:{_port}"), "o", "b", "t"), arrays, TimeProvider.System, NullLogger<InfluxForwarder>.Instance);

    private static async Task Write(MetricStore store, DateTimeOffset start, int first, int count)
    {
        for (int k = first; k < first + count; k++)
        {
            await store.WriteAsync(new MetricsOutput("aft", start.AddSeconds(10 * k), new MetricSet(
                new Dictionary<string, float[]> { ["levelDecibels"] = [k, 100 + k], ["phaseDegrees"] = [float.NaN, 1] },
                new Dictionary<string, double> { ["misfit"] = 0.25 })), None);
        }

        await store.FlushAsync(None);
    }

    private async Task StartServerAsync()
    {
        _server = Process.Start(new ProcessStartInfo("victoria-metrics")
        {
            ArgumentList = { $"-storageDataPath={_folder}/vm", $"-httpListenAddr=127.0.0.1:{_port}", "-loggerLevel=ERROR" },
            UseShellExecute = false,
        }) ?? throw new InvalidOperationException("victoria-metrics does not start");
        using PeriodicTimer timer = new(TimeSpan.FromMilliseconds(100));
        for (int tries = 0; tries < 300; tries++)
        {
            try
            {
                if ((await _http.GetAsync(new Uri($"http://127.0.0.1:{_port}/health"), None)).IsSuccessStatusCode) return;
            }
            catch (HttpRequestException)
            {
                // Not listening yet.
            }

            await timer.WaitForNextTickAsync(None);
        }

        throw new InvalidOperationException("victoria-metrics does not listen within half a minute");
    }

    private void StopServer()
    {
        if (_server is null) return;
        _server.Kill();
        _server.WaitForExit();
        _server.Dispose();
    }
}
