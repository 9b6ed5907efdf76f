using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField;

/// <summary>What a noise-field component is told when it lists its atoms for one bin.</summary>
/// <param name="Geometry">Where the N channels are.</param>
/// <param name="Shape">Principal axes and extents of the geometry.</param>
/// <param name="Frequency">Bin centre, hertz.</param>
/// <param name="SoundSpeed">m/s.</param>
/// <param name="Hints">Unit vectors toward sources that coarser bins found; a grid is refined around them.</param>
/// <param name="HintSpacing">Spacing, in direction cosine, of the grid that the hints come from.</param>
public sealed record FieldContext(
    ArrayGeometry Geometry, ArrayShape Shape, double Frequency, double SoundSpeed,
    IReadOnlyList<Position> Hints, double HintSpacing);
