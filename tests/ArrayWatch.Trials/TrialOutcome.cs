using ArrayWatch.Detection;

namespace ArrayWatch.Trials;

/// <summary>A finding when it first stood.</summary>
/// <param name="SceneSeconds">Scene time of the decision that raised it.</param>
/// <param name="Finding">What it said then.</param>
internal sealed record Raised(double SceneSeconds, Finding Finding);

/// <summary>How one trial went.</summary>
internal sealed record TrialOutcome
{
    /// <summary>What was tried.</summary>
    public required TrialCase Case { get; init; }

    /// <summary>Findings as they first stood, oldest first.</summary>
    public required IReadOnlyList<Raised> Raised { get; init; }

    /// <summary>What the last decision said.</summary>
    public required Diagnosis Last { get; init; }

    /// <summary>Event time watched after the warm-up, seconds.</summary>
    public required double WatchedSeconds { get; init; }

    /// <summary>Decisions, and the processor time of one, milliseconds.</summary>
    public required double MillisecondsPerDecision { get; init; }

    /// <summary>Findings that no fault caused: before it, or in a healthy scene, or on channels that it spares.</summary>
    public IEnumerable<Raised> False => Raised.Where(r =>
        Case.Fault is not { } fault || r.SceneSeconds < fault.StartSeconds || !r.Finding.Indices.Any(i => Touched(fault, i)));

    /// <summary>Findings about the fault.</summary>
    public IEnumerable<Raised> About => Case.Fault is { } fault
        ? Raised.Where(r => r.SceneSeconds >= fault.StartSeconds && r.Finding.Indices.Any(i => Touched(fault, i)))
        : [];

    /// <summary>The first finding about the fault of the right kind.</summary>
    public Raised? Right => About.FirstOrDefault(r => r.Finding.Kind == Case.Fault!.Kind);

    /// <summary>The finding that stands at the end on the fault's channels: of the right kind if any does.</summary>
    public Finding? Standing
    {
        get
        {
            if (Case.Fault is not { } fault) return null;
            Finding[] about = [.. Last.Findings.Where(f => f.Indices.Any(i => Touched(fault, i)))];
            return about.FirstOrDefault(f => f.Kind == fault.Kind) ?? about.FirstOrDefault();
        }
    }

    /// <summary>True when the right kind was raised with exactly the right channels.</summary>
    public bool IsExact => Case.Fault is { } fault && About.Any(r => r.Finding.Kind == fault.Kind && r.Finding.Indices.SequenceEqual(fault.Channels));

    /// <summary>True when nothing else was raised: one cause, one alert.</summary>
    public bool IsClean => Case.Fault is null ? Raised.Count == 0 : IsExact && Raised.Count == 1;

    private static bool Touched(Simulation.Faults.Fault fault, int channel) =>
        fault.Channels.Contains(channel) || (fault is Simulation.Faults.CrosstalkFault leak && leak.From == channel);
}
