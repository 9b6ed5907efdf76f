namespace ArrayWatch.Detection.Hypotheses;

/// <summary>
/// One kind of fault: proposes explanations of what the decision sees. A new kind is one class and one line in
/// <see cref="FaultHypotheses"/>.
/// </summary>
internal interface IFaultHypothesis
{
    /// <summary>Adds what it proposes to <paramref name="scene"/>, and claims the channels that need no other explanation.</summary>
    void Propose(DecisionScene scene);
}
