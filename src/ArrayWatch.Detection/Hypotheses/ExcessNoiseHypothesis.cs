using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>Incoherent noise above what the field and the array's usual self-noise explain, at the channel's own gain.</summary>
internal sealed class ExcessNoiseHypothesis : IFaultHypothesis
{
    public void Propose(DecisionScene scene)
    {
        foreach (ChannelSummary s in scene.Unexplained.ToArray())
        {
            // A channel that is too loud and still coherent has a gain, not noise.
            if (s.ExcessDecibels <= 0.8 * scene.Tolerances.ExcessDecibels || (s.IsVisible && s.CoherenceKept > 0.75)) continue;
            scene.Claim(new Candidate
            {
                Kind = "excess-noise",
                Indices = [s.Index],
                Nats = DecisionScene.Beyond(s.ExcessDecibels, scene.Tolerances.ExcessDecibels, Math.Max(s.ExcessError, 0.3)),
                Estimate = new Dictionary<string, object>
                {
                    ["excessDecibels"] = s.ExcessDecibels,
                    ["standardErrorDecibels"] = s.ExcessError,
                },
                Evidence = new Dictionary<string, double>
                {
                    ["level against expected, dB"] = s.LevelRatioDecibels,
                    ["share of expected coherence kept"] = s.CoherenceKept,
                },
            });
        }
    }
}
