using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>Amplitude off what the field says by more than tolerance, the same in every bin.</summary>
internal sealed class GainHypothesis : IFaultHypothesis
{
    public void Propose(DecisionScene scene)
    {
        double limit = scene.Tolerances.GainDecibels;
        foreach (ChannelSummary s in scene.Unexplained.ToArray())
        {
            if (!s.IsVisible || Math.Abs(s.GainDecibels) < 0.8 * limit) continue;
            double error = Math.Max(s.GainErrorDecibels, 0.1);
            scene.Claim(new Candidate
            {
                Kind = "gain",
                Indices = [s.Index],
                Size = s.GainDecibels / limit,
                Nats = DecisionScene.Beyond(s.GainDecibels, limit, error),
                Estimate = new Dictionary<string, object> { ["gainDecibels"] = s.GainDecibels, ["standardErrorDecibels"] = error },
                Evidence = new Dictionary<string, double>
                {
                    ["level against expected, dB"] = s.LevelRatioDecibels,
                    ["share of expected coherence kept"] = s.CoherenceKept,
                },
            });
        }
    }
}
