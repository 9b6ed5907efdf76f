namespace ArrayWatch.NoiseField.Components;

/// <summary>Uncorrelated plane waves on a grid that suits the array and the bin.</summary>
public sealed class PlaneWavesComponent : IFieldComponent
{
    /// <inheritdoc/>
    public string Name => "plane-waves";

    /// <inheritdoc/>
    public void Describe(FieldContext context, FieldAtoms atoms)
    {
        ArgumentNullException.ThrowIfNull(atoms);
        var (directions, spacing) = DirectionGrid.For(context);
        atoms.AddWaves(directions, spacing);
    }
}
