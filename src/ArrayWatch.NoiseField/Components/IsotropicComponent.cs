using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Components;

/// <summary>Diffuse noise: spherically isotropic, and cylindrically isotropic about the vertical.</summary>
public sealed class IsotropicComponent : IFieldComponent
{
    /// <inheritdoc/>
    public string Name => "isotropic";

    /// <inheritdoc/>
    public void Describe(FieldContext context, FieldAtoms atoms)
    {
        ArgumentNullException.ThrowIfNull(context);
        ArgumentNullException.ThrowIfNull(atoms);
        int n = context.Geometry.Count;
        ComplexMatrix spherical = new(n, n), cylindrical = new(n, n);
        CoherenceMatrix.Fill(context.Geometry, d => IsotropicNoise.Spherical(d, context.Frequency, context.SoundSpeed), spherical);
        CoherenceMatrix.Fill(
            context.Geometry, d => IsotropicNoise.Cylindrical(d, new Position(0, 0, 1), context.Frequency, context.SoundSpeed), cylindrical);
        atoms.AddCoherence(Name, spherical);
        atoms.AddCoherence(Name, cylindrical);
    }
}
