using System.Diagnostics;
using System.Globalization;
using System.Threading.Channels;

namespace ArrayWatch.EndToEnd.Tests.Service;

/// <summary>The built program as a process of its own, started from a folder that is not the repository's.</summary>
internal sealed class ServiceProcess : IAsyncDisposable
{
    private static readonly TimeSpan _patience = TimeSpan.FromSeconds(120);
    private readonly Process _process;
    private readonly Channel<string> _lines = Channel.CreateUnbounded<string>();
    private readonly List<string> _output = [];
    private readonly List<string> _errors = [];

    private ServiceProcess(Process process) => _process = process;

    /// <summary>What it has written so far, for a failed test's message.</summary>
    public string Output
    {
        get
        {
            lock (_output) return string.Join('\n', _output);
        }
    }

    /// <summary>Lines of standard error so far.</summary>
    public IReadOnlyList<string> Errors
    {
        get
        {
            lock (_errors) return [.. _errors];
        }
    }

    /// <summary>The program as <c>dotnet build</c> makes it.</summary>
    public static string Program { get; } = FindProgram();

    public static ServiceProcess Start(params string[] arguments)
    {
        ProcessStartInfo start = new(Program)
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            WorkingDirectory = Path.GetTempPath(),
        };
        foreach (string argument in arguments) start.ArgumentList.Add(argument);
        start.Environment.Remove("ASPNETCORE_ENVIRONMENT");
        start.Environment.Remove("DOTNET_ENVIRONMENT");
        ServiceProcess service = new(new Process { StartInfo = start });
        service._process.OutputDataReceived += (_, e) => service.Take(service._output, e.Data, isOutput: true);
        service._process.ErrorDataReceived += (_, e) => service.Take(service._errors, e.Data, isOutput: false);
        service._process.Start();
        service._process.BeginOutputReadLine();
        service._process.BeginErrorReadLine();
        return service;
    }

    /// <summary>Runs to the end and answers the exit code.</summary>
    public async Task<int> EndAsync()
    {
        using CancellationTokenSource limit = new(_patience);
        await _process.WaitForExitAsync(limit.Token);
        return _process.ExitCode;
    }

    /// <summary>Waits for a line of standard output.</summary>
    public async Task<string> LineAsync(Func<string, bool> isWanted)
    {
        using CancellationTokenSource limit = new(_patience);
        try
        {
            await foreach (string line in _lines.Reader.ReadAllAsync(limit.Token))
            {
                if (isWanted(line)) return line;
            }
        }
        catch (OperationCanceledException)
        {
            // Told below, with what was written instead.
        }

        throw new InvalidOperationException($"The line did not come. Output:\n{Output}\nErrors:\n{string.Join('\n', Errors)}");
    }

    /// <summary>Sends a signal: TERM as a service manager does, INT as Ctrl-C does.</summary>
    public async Task SignalAsync(string name)
    {
        using Process kill = Process.Start("kill", [$"-{name}", _process.Id.ToString(CultureInfo.InvariantCulture)]);
        await kill.WaitForExitAsync();
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        if (!_process.HasExited)
        {
            _process.Kill(entireProcessTree: true);
            await _process.WaitForExitAsync();
        }

        _process.Dispose();
    }

    private void Take(List<string> lines, string? line, bool isOutput)
    {
        if (line is null)
        {
            if (isOutput) _lines.Writer.TryComplete();
            return;
        }

        lock (lines) lines.Add(line);
        if (isOutput) _lines.Writer.TryWrite(line);
    }

    private static string FindProgram()
    {
        string configuration = AppContext.BaseDirectory.Contains("/Debug/", StringComparison.Ordinal) ? "Debug" : "Release";
        for (DirectoryInfo? folder = new(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "ArrayWatch.sln")))
                return Path.Combine(folder.FullName, "src", "ArrayWatch", "bin", configuration, "net10.0", "ArrayWatch");
        }

        throw new DirectoryNotFoundException("The tests run from a build folder inside the repository.");
    }
}
