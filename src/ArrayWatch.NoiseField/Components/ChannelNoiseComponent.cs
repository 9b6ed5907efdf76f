namespace ArrayWatch.NoiseField.Components;

/// <summary>Noise of each channel of its own: self-noise, wind at one microphone, flow at one hydrophone.</summary>
public sealed class ChannelNoiseComponent : IFieldComponent
{
    /// <inheritdoc/>
    public string Name => "channel-noise";

    /// <inheritdoc/>
    public void Describe(FieldContext context, FieldAtoms atoms)
    {
        ArgumentNullException.ThrowIfNull(atoms);
        atoms.AddChannelNoise();
    }
}
