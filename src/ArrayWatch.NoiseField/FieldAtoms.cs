using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField;

/// <summary>The atoms of one bin's field as its components list them.</summary>
public sealed class FieldAtoms
{
    private readonly List<Position> _directions = [];
    private readonly List<(string Name, ComplexMatrix Coherence)> _dense = [];

    /// <summary>Unit vectors toward plane-wave atoms.</summary>
    public IReadOnlyList<Position> Directions => _directions;

    /// <summary>Atoms that are whole coherence matrices of unit diagonal, with their component's name.</summary>
    public IReadOnlyList<(string Name, ComplexMatrix Coherence)> Dense => _dense;

    /// <summary>Spacing of the plane-wave grid in direction cosine; 0 for none.</summary>
    public double Spacing { get; private set; }

    /// <summary>True when each channel has noise of its own.</summary>
    public bool HasChannelNoise { get; private set; }

    /// <summary>Adds plane waves.</summary>
    /// <param name="directions">Unit vectors toward the sources.</param>
    /// <param name="spacing">Distance between neighbours in direction cosine.</param>
    public void AddWaves(IEnumerable<Position> directions, double spacing)
    {
        _directions.AddRange(directions);
        Spacing = spacing;
    }

    /// <summary>Adds a field that is one coherence matrix.</summary>
    /// <param name="name">The component's name.</param>
    /// <param name="coherence">N×N Hermitian, unit diagonal.</param>
    public void AddCoherence(string name, ComplexMatrix coherence) => _dense.Add((name, coherence));

    /// <summary>Lets each channel have noise of its own.</summary>
    public void AddChannelNoise() => HasChannelNoise = true;
}
