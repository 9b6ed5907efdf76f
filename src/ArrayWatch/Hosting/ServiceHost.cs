using System.Net.Sockets;
using ArrayWatch.Commands;
using ArrayWatch.Configuration;
using ArrayWatch.Messaging;
using ArrayWatch.Monitoring;
using ArrayWatch.Storage;
using ArrayWatch.Web;
using Microsoft.AspNetCore.Connections;

namespace ArrayWatch.Hosting;

/// <summary>Composes the service from its parts and runs it.</summary>
internal static class ServiceHost
{
    private static readonly TimeSpan _stopLimit = TimeSpan.FromSeconds(9);

    /// <summary>Runs until a stop is asked for and answers the exit code.</summary>
    /// <param name="configuration">What to run.</param>
    /// <param name="errors">Where causes of a failed start go, one line each.</param>
    /// <param name="cancellation">Asks for a stop, as SIGTERM does.</param>
    /// <param name="addMore">Adds further services, which start last; null for none.</param>
    /// <param name="started">Called once everything runs; null for nothing.</param>
    public static async Task<int> RunAsync(
        ServiceConfiguration configuration, TextWriter errors, CancellationToken cancellation,
        Action<IServiceCollection>? addMore = null, Action? started = null)
    {
        IHost host;
        try
        {
            host = Create(configuration, addMore);
        }
        catch (Exception exception) when (exception is IOException or UnauthorizedAccessException)
        {
            await errors.WriteLineAsync($"The log folder {configuration.Log.Folder} (log.folder) cannot be used: {exception.Message}");
            return ExitCode.Unavailable;
        }
        catch (StoreUnavailableException exception)
        {
            await errors.WriteLineAsync(exception.Message);
            return ExitCode.Unavailable;
        }

        await using (host as IAsyncDisposable)
        {
            try
            {
                await host.StartAsync(cancellation);
            }
            catch (OperationCanceledException) when (IsStopping(host))
            {
                // Told to stop before everything ran.
                await host.StopAsync(CancellationToken.None);
                return ExitCode.Success;
            }
            catch (Exception exception) when (Unavailable(exception, configuration) is { } cause)
            {
                // Else the services that did start would log their end as a failure.
                host.Services.GetRequiredService<IHostApplicationLifetime>().StopApplication();
                await errors.WriteLineAsync(cause);
                return ExitCode.Unavailable;
            }

            started?.Invoke();
            await host.WaitForShutdownAsync(cancellation);
            return host.Services.GetServices<IHostedService>().OfType<BackgroundService>().Any(static s => s.ExecuteTask is { IsFaulted: true })
                ? ExitCode.Failure
                : ExitCode.Success;
        }
    }

    private static bool IsStopping(IHost host) =>
        host.Services.GetRequiredService<IHostApplicationLifetime>().ApplicationStopping.IsCancellationRequested;

    private static IHost Create(ServiceConfiguration configuration, Action<IServiceCollection>? addMore)
    {
        if (configuration.WebUrl is not { } url)
        {
            HostApplicationBuilder plain = new(new HostApplicationBuilderSettings { DisableDefaults = true, ApplicationName = "ArrayWatch" });
            Compose(plain, configuration);
            addMore?.Invoke(plain.Services);
            return plain.Build();
        }

        WebApplicationBuilder builder = WebApplication.CreateBuilder(new WebApplicationOptions
        {
            ApplicationName = "ArrayWatch",
            ContentRootPath = AppContext.BaseDirectory,
            EnvironmentName = Environments.Production,
        });
        builder.WebHost.UseUrls(url.ToString());
        Compose(builder, configuration);
        builder.Services.AddPages();
        builder.Services.AddHealth();
        addMore?.Invoke(builder.Services);
        WebApplication app = builder.Build();
        app.MapHealth();
        app.MapOpenMetrics();
        app.MapPages();
        return app;
    }

    /// <summary>
    /// Hosted services start in this order and stop in the reverse one: first no more messages come in, then what is known goes
    /// out, then the store closes.
    /// </summary>
    private static void Compose(IHostApplicationBuilder builder, ServiceConfiguration configuration)
    {
        builder.Logging.ClearProviders();
        builder.Services.AddLog(configuration.Log);
        builder.Services.AddSystemd();
        builder.Services.Configure<HostOptions>(static o => o.ShutdownTimeout = _stopLimit);
        builder.Services.AddMeasurements();
        builder.Services.AddSingleton(configuration.Arrays);
        builder.Services
            .AddStorage(
                configuration.Arrays,
                new StoreOptions(configuration.Store.Path, configuration.Store.RetentionDays),
                configuration.Influx is { } i ? new InfluxOptions(i.Url, i.Organization, i.Bucket, Token(i)) : null)
            .AddMonitoring(configuration.Arrays)
            .AddMessaging(configuration.Broker);
    }

    private static string Token(InfluxSettings settings)
    {
        if (settings.Token is { } token) return token;
        if (settings.TokenFile is not { } file) return "";
        try
        {
            return File.ReadAllText(file).Trim();
        }
        catch (Exception exception) when (exception is IOException or UnauthorizedAccessException)
        {
            throw new StoreUnavailableException($"the token file {file} (influx.tokenFile) cannot be read: {exception.Message}", exception);
        }
    }

    /// <summary>One line for people when a port or a file cannot be had; null when it is something else.</summary>
    private static string? Unavailable(Exception exception, ServiceConfiguration configuration) => exception switch
    {
        MessagingStartException => exception.Message,
        StoreUnavailableException => $"{exception.Message} (store.path)",
        IOException { InnerException: AddressInUseException } =>
            $"{configuration.WebUrl} (web.url) cannot be had: something else listens there; stop it or choose another port.",
        SocketException => $"{configuration.WebUrl} (web.url) cannot be had: {exception.Message}; choose an address and a port of this machine.",
        IOException or UnauthorizedAccessException => exception.Message,
        _ => null,
    };
}
