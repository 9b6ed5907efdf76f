namespace ArrayWatch.Messaging.Connection;

/// <summary>
/// How long to wait before the next attempt: doubled from half a second to half a minute, each shortened at random by
/// up to half so that a fleet of services does not come back in step.
/// </summary>
/// <param name="random">The randomness.</param>
internal sealed class ReconnectSchedule(Random random)
{
    /// <summary>First pause at its longest.</summary>
    public static readonly TimeSpan First = TimeSpan.FromSeconds(0.5);

    /// <summary>Longest pause.</summary>
    public static readonly TimeSpan Longest = TimeSpan.FromSeconds(30);

    private TimeSpan _next = First;

    /// <summary>The pause before the next attempt.</summary>
    public TimeSpan Next()
    {
        TimeSpan pause = _next * (0.5 + 0.5 * random.NextDouble());
        _next = _next * 2 < Longest ? _next * 2 : Longest;
        return pause;
    }

    /// <summary>An attempt has succeeded.</summary>
    public void Reset() => _next = First;
}
