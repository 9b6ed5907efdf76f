using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection;

/// <summary>
/// Judges one array, decision after decision: fits the expected noise field, explains what does not
/// fit by faults, and lets evidence add up until a fault is confirmed. Driven by event time only;
/// the same inputs give the same findings. One caller at a time.
/// </summary>
public sealed class ArrayDiagnosis
{
    private readonly ArrayGeometry _geometry;
    private readonly DiagnosisOptions _options;

    /// <summary>Starts with no knowledge of the array but its geometry.</summary>
    /// <param name="geometry">Where the channels are.</param>
    /// <param name="options">What the user says of the array.</param>
    /// <exception cref="ArgumentException">An unknown noise-field component; the message lists the known ones.</exception>
    public ArrayDiagnosis(ArrayGeometry geometry, DiagnosisOptions options)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        ArgumentNullException.ThrowIfNull(options);
        _geometry = geometry;
        _options = options;
    }

    /// <summary>Judges the array as the estimates have it now. Call at a regular interval of event time.</summary>
    /// <param name="input">The estimates.</param>
    /// <returns>What stands.</returns>
    public Diagnosis Decide(DecisionInput input)
    {
        ArgumentNullException.ThrowIfNull(input);
        return new Diagnosis
        {
            TimeSeconds = input.TimeSeconds,
            DegreesOfFreedom = input.Fast.DegreesOfFreedom,
            Ready = false,
            Field = new FieldAssessment(null, input.SoundSpeed, _options.FieldComponents.Count > 0, new Dictionary<string, double>()),
            Channels = [.. Enumerable.Range(0, _geometry.Count).Select(i => new ChannelAssessment(i, Standing.Unknown, null, null, null, null, null))],
            Findings = [],
            Corrections = [],
            Beams = [],
        };
    }

    /// <summary>Writes the fitted model's covariance of one bin, healthy channels assumed.</summary>
    /// <param name="bin">0 to F−1.</param>
    /// <param name="destination">N×N.</param>
    /// <returns>False before the first fit; the destination is then left alone.</returns>
    public bool TryCopyModel(int bin, ComplexMatrix destination)
    {
        ArgumentNullException.ThrowIfNull(destination);
        ArgumentOutOfRangeException.ThrowIfNegative(bin);
        return _geometry.Count == 0;
    }
}
