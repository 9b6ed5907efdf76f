using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Monitoring.Mapping;

/// <summary>Covariances as a coherence picture. Pure.</summary>
internal static class CoherenceMapper
{
    /// <summary>Maps the covariance of one bin as measured and, unless null, as modelled.</summary>
    public static CoherencePicture Map(
        ArrayGeometry geometry, double timeSeconds, double frequency, string scale, ComplexMatrix measured, ComplexMatrix? model)
    {
        (float[] magnitude, float[] phase) = Coherence(measured);
        (float[] modelMagnitude, float[] modelPhase) = model is null ? ([], []) : Coherence(model);
        return new CoherencePicture
        {
            Time = EventTime.FromSeconds(timeSeconds),
            Frequency = frequency,
            Scale = scale,
            Channels = geometry.Count,
            Magnitude = magnitude,
            PhaseDegrees = phase,
            ModelMagnitude = modelMagnitude,
            ModelPhaseDegrees = modelPhase,
            SeparationMetres = Separations(geometry),
        };
    }

    private static (float[] Magnitude, float[] PhaseDegrees) Coherence(ComplexMatrix s)
    {
        int n = s.Rows;
        float[] magnitude = new float[n * n], phase = new float[n * n];
        for (int l = 0; l < n; l++)
        {
            for (int m = 0; m < n; m++)
            {
                int at = (l * n) + m;
                double power = Math.Sqrt(s.Re[(l * n) + l]) * Math.Sqrt(s.Re[(m * n) + m]);
                if (!(power > 0)) continue;
                double modulus = Math.Sqrt((s.Re[at] * s.Re[at]) + (s.Im[at] * s.Im[at]));
                magnitude[at] = (float)Math.Min(1, modulus / power);
                phase[at] = (float)(Math.Atan2(s.Im[at], s.Re[at]) * 180 / Math.PI);
            }
        }

        return (magnitude, phase);
    }

    private static float[] Separations(ArrayGeometry geometry)
    {
        int n = geometry.Count;
        float[] metres = new float[n * n];
        for (int l = 0; l < n; l++)
        {
            for (int m = 0; m < n; m++) metres[(l * n) + m] = (float)geometry[l].DistanceTo(geometry[m]);
        }

        return metres;
    }
}
