namespace ArrayWatch.Commands;

/// <summary>What the process says to whoever started it.</summary>
internal static class ExitCode
{
    /// <summary>All went well, or a stop was asked for.</summary>
    public const int Success = 0;

    /// <summary>A part of the service failed in a way that it should not.</summary>
    public const int Failure = 1;

    /// <summary>The configuration or the command line cannot be used.</summary>
    public const int BadConfiguration = 2;

    /// <summary>A port or a file cannot be had.</summary>
    public const int Unavailable = 3;
}
