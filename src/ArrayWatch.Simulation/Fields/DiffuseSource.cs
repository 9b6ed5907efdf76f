using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Sound from so many places at once that only its covariance is known. The runner draws snapshots from
/// a square root of the covariance, factored again only when the sensors have moved.
/// </summary>
public abstract record DiffuseSource : FieldSource
{
    /// <summary>Adds this source's covariance E[x xᴴ] at one bin, with <see cref="FieldSource.Level"/> at 0 dB.</summary>
    /// <param name="moment">Sensors, sound speed and frequency.</param>
    /// <param name="covariance">N×N; both triangles are added to.</param>
    public abstract void AddCovariance(SoundMoment moment, ComplexMatrix covariance);
}
