using System.Diagnostics;
using ArrayWatch.Detection;
using ArrayWatch.Signals.Covariance;
using ArrayWatch.Simulation;

namespace ArrayWatch.Trials;

/// <summary>Plays a trial into the diagnosis as the service would: two memories, a decision every sixth of the fast one or every frame.</summary>
internal static class TrialRun
{
    public static TrialOutcome Run(TrialCase trial, TrialOptions options, Action<double, Diagnosis>? watch = null)
    {
        Scene scene = trial.Scene;
        SceneRunner runner = new(scene, new RandomNumbers(trial.StartValue).Fork(23));
        ArrayDiagnosis diagnosis = new(scene.Geometry, trial.Options);
        TimeSpan memory = TimeSpan.FromSeconds(trial.Options.TimeConstantSeconds);
        int n = scene.Geometry.Count, bins = scene.Frequencies.Count;
        ExponentialCovariance fast = new(n, bins, memory), recent = new(n, bins, memory / 4);
        float[] data = new float[runner.FrameLength];
        double watched = trial.Fault is null ? 3600 * options.HealthyHours : options.WatchSeconds;
        double end = options.WarmUpSeconds + watched, nextDecision = 0, busy = 0;
        List<Raised> raised = [];
        IReadOnlyList<Finding> standing = [];
        Diagnosis? last = null;
        int decisions = 0;
        while (runner.LastSnapshotSeconds < end)
        {
            runner.NextFrame(data);
            fast.Fold(data, scene.SnapshotsPerFrame, scene.SnapshotIntervalSeconds, 0);
            recent.Fold(data, scene.SnapshotsPerFrame, scene.SnapshotIntervalSeconds, 0);
            double time = runner.LastSnapshotSeconds;
            if (time < nextDecision) continue;
            nextDecision = time + (memory.TotalSeconds / 6);
            long begin = Stopwatch.GetTimestamp();
            last = diagnosis.Decide(new DecisionInput
            {
                TimeSeconds = time,
                Frequencies = scene.Frequencies,
                SoundSpeed = trial.ConfiguredSoundSpeed,
                Recent = recent,
                Fast = fast,
            });
            busy += Stopwatch.GetElapsedTime(begin).TotalMilliseconds;
            decisions++;
            foreach (Finding finding in last.Findings)
            {
                if (!standing.Any(finding.IsSameFaultAs)) raised.Add(new Raised(time, finding));
            }

            standing = last.Findings;
            watch?.Invoke(time, last);
        }

        return new TrialOutcome
        {
            Case = trial,
            Raised = raised,
            Last = last ?? throw new InvalidOperationException("a trial without a decision: its duration is too short"),
            WatchedSeconds = watched,
            MillisecondsPerDecision = busy / decisions,
        };
    }
}
