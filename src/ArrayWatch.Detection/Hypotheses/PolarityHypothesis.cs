using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>Sign reversed: a half turn in every bin.</summary>
internal sealed class PolarityHypothesis : IFaultHypothesis
{
    public void Propose(DecisionScene scene)
    {
        double limit = scene.Tolerances.PhaseDegrees * Math.PI / 180;
        foreach (ChannelSummary s in scene.Unexplained.ToArray())
        {
            if (!s.IsVisible) continue;
            bool reversed = s.Phase.Law == PhaseLaw.Reversed
                || (s.Phase.Law == PhaseLaw.Constant && Math.Abs(ApertureTrend.Wrap(s.Phase.ConstantRadians - Math.PI)) < limit);
            if (!reversed) continue;
            bool oneBin = s.Bins < 2;
            scene.Claim(new Candidate
            {
                Kind = "polarity",
                Indices = [s.Index],
                Nats = s.Phase.CostNone - Math.Min(s.Phase.CostReversed, s.Phase.CostConstant),
                Estimate = new Dictionary<string, object>(),
                Evidence = new Dictionary<string, double>
                {
                    ["phase, degrees"] = s.Phase.ConstantRadians * 180 / Math.PI,
                    ["standard error, degrees"] = s.Phase.ConstantError * 180 / Math.PI,
                    ["share of expected coherence kept"] = s.CoherenceKept,
                },
                Alternatives = oneBin ? ["phase", "delay"] : [],
                Reason = oneBin ? "one bin cannot tell a reversal from a half turn of phase or a delay of half a period" : null,
            });
        }
    }
}
