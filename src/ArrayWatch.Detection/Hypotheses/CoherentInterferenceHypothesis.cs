using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>
/// A coherent component that no acoustic wave explains: electrical pick-up, a pump on the frame. Mains frequencies are
/// suspects, not proof (EN 50160: 50 Hz ± 1 %; for 60 Hz the same width is this project's choice).
/// </summary>
internal sealed class CoherentInterferenceHypothesis : IFaultHypothesis
{
    // A channel carries the pattern when it holds at least a tenth of the field's power there,
    // and is within this of the channel that carries most.
    private const double LeastShare = 0.1;
    private const double WithinOfMost = 0.06;

    // What most channels carry reaches the array as a whole: its weaker channels are then named down to a tenth of those limits.
    private const double WholeArray = 0.6;
    private const double MainsWidth = 0.01;

    public void Propose(DecisionScene scene)
    {
        ForeignPattern[] patterns = [.. scene.Bins.Select(b => b.Foreign).OfType<ForeignPattern>()];
        if (patterns.Length == 0) return;
        int n = scene.Geometry.Count;
        double[] power = new double[n], relative = new double[n];
        foreach (ForeignPattern p in patterns)
        {
            for (int i = 0; i < n; i++)
            {
                power[i] += p.Power[i] / patterns.Length;
                relative[i] = Math.Max(relative[i], p.Relative[i]);
            }
        }

        double most = Enumerable.Range(0, n).Where(i => scene.Trusted[i]).Max(i => relative[i]);
        int[] carriers = [.. Enumerable.Range(0, n).Where(i =>
            !scene.IsClaimed(i) && !scene.OutOfService.Contains(i) && relative[i] > LeastShare && relative[i] > WithinOfMost * most)];
        if (carriers.Length < 3) return;
        if (carriers.Length > WholeArray * n)
        {
            carriers = [.. Enumerable.Range(0, n).Where(i =>
                !scene.IsClaimed(i) && !scene.OutOfService.Contains(i) && relative[i] > LeastShare / 10 && relative[i] > WithinOfMost * most / 10)];
        }

        double snapshots = scene.Bins[0].Snapshots.Max();
        double nats = patterns.Sum(p => snapshots * (p.Eigenvalue - 1 - Math.Log(p.Eigenvalue))) / 4;
        scene.Add(new Candidate
        {
            Kind = "coherent-interference",
            Identity = "pattern",
            Indices = carriers,
            // While several channels turn over in the memory, a mixture of before and after passes for a pattern.
            Nats = scene.IsSettling ? 0 : nats,
            Estimate = new Dictionary<string, object>
            {
                ["frequencies"] = patterns.Select(p => p.Frequency).ToArray(),
                ["levelDecibels"] = carriers.Select(i => 10 * Math.Log10(Math.Max(power[i], 1e-300))).ToArray(),
            },
            Evidence = new Dictionary<string, double>
            {
                ["largest eigenvalue, model noise = 1"] = patterns.Max(p => p.Eigenvalue),
                ["share that plane waves explain"] = patterns.Max(p => p.WaveShare),
            },
            Cause = Mains(patterns),
        });
    }

    private static string? Mains(ForeignPattern[] patterns)
    {
        foreach (double mains in (double[])[50, 60])
        {
            if (patterns.All(p =>
            {
                double harmonic = Math.Round(p.Frequency / mains);
                return harmonic >= 1 && Math.Abs((p.Frequency / mains) - harmonic) <= MainsWidth * harmonic;
            }))
            {
                return $"at {mains:0} Hz mains or its harmonics";
            }
        }

        return null;
    }
}
