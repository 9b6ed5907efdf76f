using ArrayWatch.Configuration;

namespace ArrayWatch.Commands;

/// <summary>Loads the configuration for a command and tells people what is wrong with it.</summary>
internal static class ConfigurationLoading
{
    /// <summary>The configuration; null when it cannot be used, with the causes written and the exit code set.</summary>
    public static ServiceConfiguration? Load(string file, TextWriter errors, out int code)
    {
        code = ExitCode.Success;
        try
        {
            return ConfigurationFile.Load(file, Environment.GetEnvironmentVariables());
        }
        catch (ConfigurationException exception)
        {
            code = ExitCode.BadConfiguration;
            foreach (string error in exception.Errors) errors.WriteLine(error);
        }
        catch (Exception exception) when (exception is IOException or UnauthorizedAccessException or ArgumentException)
        {
            code = ExitCode.Unavailable;
            errors.WriteLine($"The configuration file cannot be read: {exception.Message}");
        }

        return null;
    }
}
