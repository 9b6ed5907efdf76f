namespace ArrayWatch.Trials;

/// <summary>What a run of trials was asked for.</summary>
internal sealed record TrialOptions
{
    /// <summary>Trials of each kind, and scenes of each nuisance.</summary>
    public int Number { get; init; } = 20;

    /// <summary>Names to try; empty for all.</summary>
    public IReadOnlyList<string> Kinds { get; init; } = [];

    /// <summary>Event time before the fault, seconds.</summary>
    public double WarmUpSeconds { get; init; } = 1200;

    /// <summary>Event time watched after the fault, seconds.</summary>
    public double WatchSeconds { get; init; } = 600;

    /// <summary>Event time of a healthy scene after its warm-up, hours.</summary>
    public double HealthyHours { get; init; } = 2;

    /// <summary>Size of a fault, times tolerance.</summary>
    public double Size { get; init; } = 2;

    /// <summary>Start value of the generator that draws the trials' own start values.</summary>
    public ulong StartValue { get; init; } = 1;

    /// <summary>Trials side by side.</summary>
    public int Threads { get; init; } = 2;

    /// <summary>True lists every trial that did not go as it should.</summary>
    public bool Verbose { get; init; }

    /// <summary>Start value of the one trial to run, told in full; null for a whole run.</summary>
    public ulong? Replay { get; init; }
}
