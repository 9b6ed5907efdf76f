using ArrayWatch.Configuration;

namespace ArrayWatch.Commands;

/// <summary>Reads a configuration and says what is wrong with it, or what it describes.</summary>
internal static class CheckCommand
{
    /// <summary>Answers the exit code.</summary>
    public static int Run(string file, TextWriter output, TextWriter errors)
    {
        if (ConfigurationLoading.Load(file, errors, out int code) is not { } configuration)
            return code == ExitCode.Unavailable ? ExitCode.BadConfiguration : code;
        foreach (string line in ConfigurationSummary.Of(configuration)) output.WriteLine(line);
        return ExitCode.Success;
    }
}
