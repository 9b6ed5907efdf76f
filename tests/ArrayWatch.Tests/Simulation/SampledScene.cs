using System.Numerics;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Tests.Simulation;

/// <summary>Scenes that tests start from, and plain averages over their snapshots.</summary>
internal static class SampledScene
{
    public const double SoundSpeed = 1500;

    public static Scene Line(int count, IReadOnlyList<FieldSource> sources, params Fault[] faults) => new()
    {
        Geometry = ArrayGeometry.UniformLine(count, 1.5, new Position(1, 0, 0)),
        SoundSpeed = SoundSpeed,
        Frequencies = [120, 260],
        SnapshotIntervalSeconds = 0.5,
        SnapshotsPerFrame = 10,
        Sources = sources,
        SelfNoise = new Spectrum(-20),
        Faults = faults,
    };

    public static IReadOnlyList<FieldSource> MixedField { get; } =
    [
        new SphericalIsotropicNoise { Spectrum = new(0) },
        new PlaneWave { Spectrum = new(3), Toward = Position.Direction(0.7, 0) },
    ];

    /// <summary>Mean of x xᴴ over whole frames, a plain loop that shares nothing with the library's estimator.</summary>
    public static Complex[][,] Covariance(Scene scene, int frames, ulong startValue, double skipSeconds = 0)
    {
        SceneRunner runner = new(scene, new RandomNumbers(startValue));
        float[] data = new float[runner.FrameLength];
        int n = scene.Geometry.Count, bins = scene.Frequencies.Count, used = 0;
        Complex[][,] sum = [.. Enumerable.Range(0, bins).Select(_ => new Complex[n, n])];
        while (used < frames)
        {
            runner.NextFrame(data);
            if (runner.TimeSeconds - scene.StartTimeSeconds < skipSeconds) continue;
            used++;
            for (int k = 0; k < scene.SnapshotsPerFrame; k++)
            {
                for (int f = 0; f < bins; f++)
                {
                    int at = 2 * n * ((k * bins) + f);
                    for (int l = 0; l < n; l++)
                    {
                        for (int m = 0; m < n; m++)
                        {
                            sum[f][l, m] += new Complex(data[at + (2 * l)], data[at + (2 * l) + 1])
                                * new Complex(data[at + (2 * m)], -data[at + (2 * m) + 1]);
                        }
                    }
                }
            }
        }

        foreach (Complex[,] s in sum)
        {
            for (int l = 0; l < n; l++)
            {
                for (int m = 0; m < n; m++) s[l, m] /= used * scene.SnapshotsPerFrame;
            }
        }

        return sum;
    }

    public static Complex Coherence(Complex[,] s, int l, int m) => s[l, m] / Math.Sqrt(s[l, l].Real * s[m, m].Real);

    public static ComplexMatrix CovarianceOf(DiffuseSource source, double frequency, double soundSpeed, params Position[] positions)
    {
        ComplexMatrix covariance = new(positions.Length, positions.Length);
        source.AddCovariance(
            new SoundMoment { Positions = positions, SoundSpeed = soundSpeed, SceneSeconds = 0, FrequencyHertz = frequency }, covariance);
        return covariance;
    }
}
