using System.Collections.Immutable;
using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>The atoms of one bin in the form that the fit works with. Immutable.</summary>
public sealed class FieldBasis
{
    /// <summary>Lists and steers the atoms.</summary>
    /// <param name="context">The array and the bin.</param>
    /// <param name="components">What the field may hold.</param>
    public FieldBasis(FieldContext context, IEnumerable<IFieldComponent> components)
    {
        ArgumentNullException.ThrowIfNull(context);
        ArgumentNullException.ThrowIfNull(components);
        FieldAtoms atoms = new();
        foreach (IFieldComponent c in components) c.Describe(context, atoms);
        Channels = context.Geometry.Count;
        Directions = [.. atoms.Directions];
        Dense = [.. atoms.Dense];
        Spacing = atoms.Spacing;
        HasChannelNoise = atoms.HasChannelNoise;
        Waves = new ComplexMatrix(Math.Max(1, Directions.Length), Channels);
        for (int q = 0; q < Directions.Length; q++)
        {
            SteeringVector.PlaneWave(
                context.Geometry, Directions[q], context.Frequency, context.SoundSpeed,
                Waves.Re.AsSpan(q * Channels, Channels), Waves.Im.AsSpan(q * Channels, Channels));
        }
    }

    /// <summary>Number of channels, N.</summary>
    public int Channels { get; }

    /// <summary>Unit vectors toward the plane-wave atoms; Q of them.</summary>
    public ImmutableArray<Position> Directions { get; }

    /// <summary>Row q is the steering vector of atom q; one row of zeros when there are no waves.</summary>
    public ComplexMatrix Waves { get; }

    /// <summary>Spacing of the plane-wave grid in direction cosine.</summary>
    public double Spacing { get; }

    /// <summary>Atoms that are whole coherence matrices.</summary>
    public ImmutableArray<(string Name, ComplexMatrix Coherence)> Dense { get; }

    /// <summary>True when each channel has noise of its own.</summary>
    public bool HasChannelNoise { get; }
}
