using ArrayWatch.Configuration;
using Serilog;
using Serilog.Core;
using Serilog.Events;

namespace ArrayWatch.Hosting;

/// <summary>Registers the log: structured entries to the console, and to daily files when a folder is given.</summary>
internal static class LogServices
{
    private const string Line = "{Timestamp:yyyy-MM-dd HH:mm:ss.fff zzz} [{Level:u3}] {SourceContext}: {Message:lj}{NewLine}{Exception}";
    private const int FilesKept = 31;
    private const long FileBytes = 64 * 1024 * 1024;

    /// <summary>The host's own account of a failed start, which the program tells in one line on standard error.</summary>
    private static readonly string[] _startAccounts = ["Hosting failed to start", "Unable to start Kestrel."];

    /// <summary>Adds the log.</summary>
    /// <exception cref="IOException">The folder cannot be made.</exception>
    public static IServiceCollection AddLog(this IServiceCollection services, LogSettings settings)
    {
        LoggerConfiguration configuration = new LoggerConfiguration()
            .MinimumLevel.Is(settings.Level)
            .MinimumLevel.Override("Microsoft", LogEventLevel.Warning)
            .MinimumLevel.Override("System", LogEventLevel.Warning)
            .MinimumLevel.Override("OpenTelemetry", LogEventLevel.Warning)
            .Filter.ByExcluding(static e => _startAccounts.Contains(e.MessageTemplate.Text))
            .WriteTo.Console(outputTemplate: Line, formatProvider: System.Globalization.CultureInfo.InvariantCulture);
        if (settings.Folder is { } folder)
        {
            Directory.CreateDirectory(folder);
            configuration = configuration.WriteTo.File(
                new Serilog.Formatting.Compact.RenderedCompactJsonFormatter(), Path.Combine(folder, "arraywatch-.jsonl"),
                rollingInterval: RollingInterval.Day, rollOnFileSizeLimit: true, fileSizeLimitBytes: FileBytes, retainedFileCountLimit: FilesKept);
        }

        Logger logger = configuration.CreateLogger();
        return services.AddSerilog(logger, dispose: true);
    }
}
