namespace ArrayWatch.Detection.Hypotheses;

/// <summary>The kinds of fault that are looked for, in the order in which they may claim channels.</summary>
internal static class FaultHypotheses
{
    public static IReadOnlyList<IFaultHypothesis> All { get; } =
    [
        new SwapHypothesis(),
        new DeadHypothesis(),
        new ExcessNoiseHypothesis(),
        new PolarityHypothesis(),
        new DelayHypothesis(),
        new PhaseHypothesis(),
        new GainHypothesis(),
        new CoherentInterferenceHypothesis(),
    ];
}
