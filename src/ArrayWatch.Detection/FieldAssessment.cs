namespace ArrayWatch.Detection;

/// <summary>How well the expected noise field explains what the array hears.</summary>
/// <param name="Misfit">Residual power that the model does not explain, 0 to 1; null before the first decision.</param>
/// <param name="SoundSpeed">Sound speed used, m/s.</param>
/// <param name="Understood">False when the model fits so badly that no new channel fault is named.</param>
/// <param name="Shares">Each component's share of the power, 0 to 1, by its name.</param>
public sealed record FieldAssessment(double? Misfit, double SoundSpeed, bool Understood, IReadOnlyDictionary<string, double> Shares);
