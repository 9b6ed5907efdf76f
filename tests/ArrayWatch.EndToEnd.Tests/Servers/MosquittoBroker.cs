using System.Diagnostics;
using System.Globalization;
using System.Net;
using System.Net.Sockets;

namespace ArrayWatch.EndToEnd.Tests.Servers;

/// <summary>
/// A real Mosquitto on a free loopback port with a configuration and a data directory of its own. Use it as
/// a class fixture, or make one in a test that stops and restarts it.
/// </summary>
public sealed class MosquittoBroker : IAsyncLifetime
{
    private static readonly TimeSpan _limit = TimeSpan.FromSeconds(20);
    private readonly string _directory = Directory.CreateTempSubdirectory("arraywatch-mosquitto-").FullName;
    private readonly string[] _extraSettings;
    private Process? _process;

    /// <summary>A broker that takes anonymous clients, MQTT 3.1.1 and 5.</summary>
    public MosquittoBroker()
        : this([])
    {
    }

    private MosquittoBroker(string[] extraSettings) => _extraSettings = extraSettings;

    /// <summary>Address that it listens at.</summary>
    public static string Host => "127.0.0.1";

    /// <summary>Port that it listens at; stays the same over a restart.</summary>
    public int Port { get; private set; }

    /// <summary>A broker with more lines in its configuration.</summary>
    public static MosquittoBroker With(params string[] extraSettings) => new(extraSettings);

    /// <summary>Process id, for measurements.</summary>
    public int ProcessId => _process?.Id ?? throw new InvalidOperationException("The broker is not running; start it first.");

    /// <inheritdoc/>
    public async ValueTask InitializeAsync()
    {
        for (int attempt = 0; ; attempt++)
        {
            Port = FreePort();
            try
            {
                await StartAsync();
                return;
            }
            catch (InvalidOperationException) when (attempt < 4)
            {
                // Another process took the port between the look and the start.
            }
        }
    }

    /// <summary>Starts it at <see cref="Port"/>, with whatever its data directory holds.</summary>
    public async Task StartAsync()
    {
        string configuration = Path.Combine(_directory, "mosquitto.conf");
        await File.WriteAllLinesAsync(configuration,
        [
            string.Create(CultureInfo.InvariantCulture, $"listener {Port} {Host}"),
            "allow_anonymous true",
            "user root",
            "persistence true",
            $"persistence_location {_directory}/",
            "max_queued_messages 0",
            .. _extraSettings,
        ]);
        ProcessStartInfo start = new(FindExecutable()) { RedirectStandardError = true, RedirectStandardOutput = true };
        start.ArgumentList.Add("-c");
        start.ArgumentList.Add(configuration);
        _process = Process.Start(start) ?? throw new InvalidOperationException("mosquitto did not start.");
        _process.OutputDataReceived += static (_, _) => { };
        _process.ErrorDataReceived += static (_, _) => { };
        _process.BeginOutputReadLine();
        _process.BeginErrorReadLine();
        await WaitForPortAsync();
    }

    /// <summary>Ends it: in order (sessions and retained messages are kept), or at once as in a power failure.</summary>
    public async Task StopAsync(bool inOrder = true)
    {
        if (_process is not { } process) return;
        _process = null;
        if (!process.HasExited)
        {
            if (inOrder)
            {
                using Process signal = Process.Start("kill", ["-TERM", process.Id.ToString(CultureInfo.InvariantCulture)]);
                await signal.WaitForExitAsync();
            }
            else
            {
                process.Kill();
            }
            using CancellationTokenSource limit = new(_limit);
            await process.WaitForExitAsync(limit.Token);
        }
        process.Dispose();
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await StopAsync(inOrder: false);
        Directory.Delete(_directory, recursive: true);
    }

    /// <summary>A loopback port that nothing listens at just now.</summary>
    public static int FreePort()
    {
        using TcpListener probe = new(IPAddress.Loopback, 0);
        probe.Start();
        return ((IPEndPoint)probe.LocalEndpoint).Port;
    }

    private async Task WaitForPortAsync()
    {
        using CancellationTokenSource limit = new(_limit);
        using PeriodicTimer pause = new(TimeSpan.FromMilliseconds(20));
        while (true)
        {
            if (_process!.HasExited)
                throw new InvalidOperationException($"mosquitto ended with exit code {_process.ExitCode}; is port {Port} taken?");
            try
            {
                using TcpClient client = new();
                await client.ConnectAsync(IPAddress.Loopback, Port, limit.Token);
                return;
            }
            catch (SocketException)
            {
                await pause.WaitForNextTickAsync(limit.Token);
            }
        }
    }

    private static string FindExecutable()
    {
        string path = Environment.GetEnvironmentVariable("PATH") ?? "";
        return path.Split(Path.PathSeparator).Append("/usr/sbin").Append("/usr/local/sbin")
            .Select(static folder => Path.Combine(folder, "mosquitto"))
            .FirstOrDefault(File.Exists)
            ?? throw new InvalidOperationException("mosquitto is not installed; tests/run.sh installs it (apt-get install mosquitto).");
    }
}
