using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>Time error: a phase in proportion to frequency.</summary>
internal sealed class DelayHypothesis : IFaultHypothesis
{
    public void Propose(DecisionScene scene)
    {
        foreach (ChannelSummary s in scene.Unexplained.ToArray())
        {
            if (!s.IsVisible || s.Phase.Law is not (PhaseLaw.Delay or PhaseLaw.Both)) continue;
            double tau = 1e6 * (s.Phase.Law == PhaseLaw.Delay ? s.Phase.DelaySeconds : s.Phase.BothDelay);
            double constant = s.Phase.Law == PhaseLaw.Delay ? 0 : Math.Abs(s.Phase.BothConstant) * 180 / Math.PI;
            double limit = scene.Tolerances.DelayMicroseconds;
            if (Math.Abs(tau) < 0.8 * limit || constant / scene.Tolerances.PhaseDegrees > Math.Abs(tau) / limit) continue;
            double error = 1e6 * s.Phase.DelayError;
            scene.Claim(new Candidate
            {
                Kind = "delay",
                Indices = [s.Index],
                Size = tau / limit,
                Nats = Math.Min(DecisionScene.Beyond(tau, limit, Math.Max(error, 0.02 * limit)), s.Phase.CostNone - s.Phase.CostDelay),
                Estimate = new Dictionary<string, object> { ["delayMicroseconds"] = tau, ["standardErrorMicroseconds"] = error },
                Evidence = new Dictionary<string, double>
                {
                    ["cost as a constant phase, nats"] = s.Phase.CostConstant,
                    ["cost as a delay, nats"] = s.Phase.CostDelay,
                    ["share of expected coherence kept"] = s.CoherenceKept,
                },
                Alternatives = s.Bins < 2 ? ["phase"] : [],
                Reason = s.Bins < 2 ? "one bin cannot tell a delay from a phase" : null,
            });
        }
    }
}
