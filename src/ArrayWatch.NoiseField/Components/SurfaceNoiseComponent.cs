using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Components;

/// <summary>Noise of dipole sources on the sea surface (z points up).</summary>
public sealed class SurfaceNoiseComponent : IFieldComponent
{
    /// <inheritdoc/>
    public string Name => "surface";

    /// <inheritdoc/>
    public void Describe(FieldContext context, FieldAtoms atoms)
    {
        ArgumentNullException.ThrowIfNull(context);
        ArgumentNullException.ThrowIfNull(atoms);
        ComplexMatrix coherence = new(context.Geometry.Count, context.Geometry.Count);
        CoherenceMatrix.Fill(
            context.Geometry, d => SurfaceNoise.Coherence(d, new Position(0, 0, 1), context.Frequency, context.SoundSpeed), coherence);
        atoms.AddCoherence(Name, coherence);
    }
}
