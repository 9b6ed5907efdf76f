using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>A phase error that does not grow with frequency.</summary>
internal sealed class PhaseHypothesis : IFaultHypothesis
{
    public void Propose(DecisionScene scene)
    {
        foreach (ChannelSummary s in scene.Unexplained.ToArray())
        {
            if (!s.IsVisible || s.Phase.Law is not (PhaseLaw.Constant or PhaseLaw.Both)) continue;
            double degrees = (s.Phase.Law == PhaseLaw.Constant ? s.Phase.ConstantRadians : s.Phase.BothConstant) * 180 / Math.PI;
            double limit = scene.Tolerances.PhaseDegrees, error = s.Phase.ConstantError * 180 / Math.PI;
            if (Math.Abs(degrees) < 0.8 * limit) continue;
            scene.Claim(new Candidate
            {
                Kind = "phase",
                Indices = [s.Index],
                Size = degrees / limit,
                Nats = Math.Min(
                    DecisionScene.Beyond(degrees, limit, Math.Max(error, 0.3 * s.ModelError * 180 / Math.PI)), s.Phase.CostNone - s.Phase.CostConstant),
                Estimate = new Dictionary<string, object> { ["phaseDegrees"] = degrees, ["standardErrorDegrees"] = error },
                Evidence = new Dictionary<string, double>
                {
                    ["cost as a constant phase, nats"] = s.Phase.CostConstant,
                    ["cost as a delay, nats"] = s.Phase.CostDelay,
                    ["share of expected coherence kept"] = s.CoherenceKept,
                },
                Alternatives = s.Bins < 2 ? ["delay"] : [],
                Reason = s.Bins < 2 ? "one bin cannot tell a phase from a delay" : null,
            });
        }
    }
}
