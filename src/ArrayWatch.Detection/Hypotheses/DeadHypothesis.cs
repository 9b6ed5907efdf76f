using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>
/// No acoustic signal reaches the channel: its coherence with what the others predict is gone and its level has fallen, or the level
/// has fallen so far that nothing else is left to say.
/// </summary>
internal sealed class DeadHypothesis : IFaultHypothesis
{
    // A channel that keeps less of its coherence than this hears no sound that matters.
    private const double Deaf = 0.12;

    // Below this no tolerance of gain is meant: common practice, no source.
    private const double Fallen = -12;

    public void Propose(DecisionScene scene)
    {
        foreach (ChannelSummary s in scene.Unexplained.ToArray())
        {
            bool zero = s.Level <= 0;
            bool deaf = s.CoherenceKept < Deaf && s.ExpectedCoherence > 0.04;
            bool fallen = s.LevelRatioDecibels < Fallen;
            double lost = s.Bins * s.Snapshots * s.ExpectedCoherence * Math.Max(0, 1 - s.CoherenceKept);
            if (!(zero || (deaf && s.LevelRatioDecibels < scene.Tolerances.ExcessDecibels) || (fallen && !s.IsVisible))) continue;
            bool blind = !zero && !deaf;
            scene.Claim(new Candidate
            {
                Kind = "dead",
                Indices = [s.Index],
                Nats = zero ? 1000 : blind ? DecisionScene.Beyond(s.LevelRatioDecibels, -Fallen, 1) : lost,
                Estimate = new Dictionary<string, object> { ["levelDecibels"] = s.LevelDecibels },
                Evidence = new Dictionary<string, double>
                {
                    ["level against expected, dB"] = s.LevelRatioDecibels,
                    ["share of expected coherence kept"] = s.CoherenceKept,
                    ["expected coherence"] = s.ExpectedCoherence,
                },
                Alternatives = blind ? ["gain"] : [],
                Reason = blind ? "this field shows too little coherence between channels to tell a dead channel from a very weak one" : null,
            });
        }
    }
}
