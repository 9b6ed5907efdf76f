namespace ArrayWatch.Demo;

/// <summary>When the show began, so that its times can be told as people follow them. Safe from any thread once started.</summary>
internal sealed class DemoClock
{
    /// <summary>The scenes' first seconds are played at once, so that the estimates have settled before the first fault.</summary>
    private const double LeadSeconds = 10;

    /// <summary>When people began to watch.</summary>
    public DateTimeOffset Started { get; private set; }

    /// <summary>Event time of every scene's start.</summary>
    public DateTimeOffset SceneStart => Started.AddSeconds(-LeadSeconds);

    /// <summary>Sets the start.</summary>
    public void Start(DateTimeOffset now) => Started = now;

    /// <summary>Minutes and seconds since the start.</summary>
    public string Since(DateTimeOffset moment) => Text((moment - Started).TotalSeconds);

    /// <summary>A scene's time as people will see it, in minutes and seconds.</summary>
    public static string OfScene(double sceneSeconds) => Text(sceneSeconds - LeadSeconds);

    private static string Text(double seconds) => FormattableString.Invariant($"{(int)Math.Max(0, seconds) / 60}:{(int)Math.Max(0, seconds) % 60:00}");
}
