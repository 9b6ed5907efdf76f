using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Simulation;

/// <summary>
/// The diffuse sources of a scene, ready to draw from: one square root a bin for all steady sources
/// together, and one a bin for each source whose level changes.
/// </summary>
internal sealed class DiffuseField
{
    private readonly Scene _scene;
    private readonly DiffuseSource[][] _layers;
    private readonly CovarianceRoot[][] _roots;

    public DiffuseField(Scene scene)
    {
        _scene = scene;
        DiffuseSource[] all = [.. scene.Sources.OfType<DiffuseSource>()];
        DiffuseSource[] steady = [.. all.Where(s => s.Level is null)];
        _layers = [.. (steady.Length > 0 ? [steady] : Array.Empty<DiffuseSource[]>()), .. all.Where(s => s.Level is not null).Select(s => new[] { s })];
        _roots = [.. _layers.Select(_ => new CovarianceRoot[scene.Frequencies.Count])];
    }

    public void Rebuild(ReadOnlySpan<Position> positions, double sceneSeconds)
    {
        ComplexMatrix covariance = new(positions.Length, positions.Length);
        for (int layer = 0; layer < _layers.Length; layer++)
        {
            for (int f = 0; f < _scene.Frequencies.Count; f++)
            {
                covariance.Clear();
                foreach (DiffuseSource source in _layers[layer])
                {
                    source.AddCovariance(
                        new SoundMoment
                        {
                            Positions = positions,
                            SoundSpeed = _scene.SoundSpeed,
                            SceneSeconds = sceneSeconds,
                            FrequencyHertz = _scene.Frequencies[f],
                        },
                        covariance);
                }

                _roots[layer][f] = new CovarianceRoot(covariance);
            }
        }
    }

    public void AddDraw(double sceneSeconds, int bin, RandomNumbers random, Span<double> re, Span<double> im)
    {
        for (int layer = 0; layer < _layers.Length; layer++)
        {
            double decibels = _layers[layer][0].Level?.DecibelsAt(sceneSeconds) ?? 0;
            _roots[layer][bin].AddDraw(decibels == 0 ? 1 : Decibels.ToAmplitude(decibels), random, re, im);
        }
    }
}
