using ArrayWatch.Hosting;

namespace ArrayWatch.Commands;

/// <summary>Runs the service.</summary>
internal static class RunCommand
{
    /// <summary>Answers the exit code once the service has been told to stop.</summary>
    public static Task<int> RunAsync(string file, CancellationToken cancellation) =>
        ConfigurationLoading.Load(file, Console.Error, out int code) is { } configuration
            ? ServiceHost.RunAsync(configuration, Console.Error, cancellation)
            : Task.FromResult(code);
}
