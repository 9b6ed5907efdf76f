namespace ArrayWatch.Demo;

/// <summary>When the show began, so that its times can be told as people follow them. Safe from any thread once started.</summary>
internal sealed class DemoClock
{
    /// <summary>Start of every scene.</summary>
    public DateTimeOffset Started { get; private set; }

    /// <summary>Sets the start.</summary>
    public void Start(DateTimeOffset now) => Started = now;

    /// <summary>Minutes and seconds since the start.</summary>
    public string Since(DateTimeOffset moment) => Text((moment - Started).TotalSeconds);

    /// <summary>Seconds as minutes and seconds.</summary>
    public static string Text(double seconds) => FormattableString.Invariant($"{(int)Math.Max(0, seconds) / 60}:{(int)Math.Max(0, seconds) % 60:00}");
}
