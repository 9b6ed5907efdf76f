using System.Net;
using System.Net.Sockets;
using ArrayWatch.Configuration;
using ArrayWatch.Demo;
using ArrayWatch.Hosting;
using ArrayWatch.Messaging;
using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Simulation;
using Serilog.Events;

namespace ArrayWatch.Commands;

/// <summary>Shows the service at work on invented arrays: broker, store and pages in this process, nothing left behind.</summary>
internal static class DemoCommand
{
    private const int FirstWebPort = 8080, WebPortsTried = 50;

    /// <summary>Answers the exit code once Ctrl-C has been pressed.</summary>
    public static async Task<int> RunAsync(CancellationToken cancellation)
    {
        DirectoryInfo folder = Directory.CreateTempSubdirectory("arraywatch-demo-");
        try
        {
            IReadOnlyList<DemoScene> scenes = DemoScenes.All();
            ServiceConfiguration configuration = Configuration(scenes, folder.FullName);
            DemoClock clock = new();
            return await ServiceHost.RunAsync(configuration, Console.Error, cancellation, services =>
            {
                services.AddSingleton<IMonitorSink>(new ConsoleSink(clock, Console.Out));
                services.AddHostedService(p => new ScenePublisher(scenes, clock, configuration.Broker, p.GetRequiredService<TimeProvider>()));
            }, () =>
            {
                foreach (string line in Programme.Lines(scenes, configuration.WebUrl!)) Console.Out.WriteLine(line);
            });
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }

    private static ServiceConfiguration Configuration(IReadOnlyList<DemoScene> scenes, string folder) => new()
    {
        Broker = new MqttOptions { Embedded = true, Port = FreePort(0, 1), ClientId = "arraywatch-demo" },
        Store = new StoreSettings(Path.Combine(folder, "demo.db"), 1),
        WebUrl = new Uri($"http://127.0.0.1:{FreePort(FirstWebPort, WebPortsTried)}"),
        Log = new LogSettings(null, LogEventLevel.Warning),
        Arrays = [.. scenes.Select(static s => new ArrayDefinition
        {
            Id = s.Id,
            Geometry = s.Scene.Geometry,
            Medium = new Medium.Given(s.Scene.SoundSpeed),
            TimeConstant = s.TimeConstant,
            SlowTimeConstant = 30 * s.TimeConstant,
            FieldComponents = s.FieldComponents,
            LookDirections = DefaultLookDirections.Of(s.Scene.Geometry),
        })],
    };

    /// <summary>The first port from <paramref name="first"/> on that nothing listens at; 0: any.</summary>
    private static int FreePort(int first, int tries)
    {
        for (int port = first; port < first + tries; port++)
        {
            using TcpListener probe = new(IPAddress.Loopback, port);
            try
            {
                probe.Start();
                return ((IPEndPoint)probe.LocalEndpoint).Port;
            }
            catch (SocketException)
            {
                // Taken: the next one.
            }
        }

        return first;
    }
}
