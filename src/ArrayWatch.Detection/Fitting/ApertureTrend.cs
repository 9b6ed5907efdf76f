using ArrayWatch.NoiseField;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// Takes out of one bin's responses what the field model leaves undetermined or cannot know: a common gain and phase, a phase
/// linear in position (a turn of the field), and phases that vary smoothly along the aperture (a bowed line, a curved
/// wave front, correlated paths). A channel's fault is a step against its neighbours and survives.
/// </summary>
internal sealed class ApertureTrend
{
    private const int Reweightings = 8;
    private const double Huber = 1.5;

    private readonly double[][] _terms;

    /// <summary>Chooses a polynomial that the number of channels can carry.</summary>
    public ApertureTrend(ArrayGeometry geometry, ArrayShape shape)
    {
        int n = geometry.Count;
        double[][] along = [.. Enumerable.Range(0, Math.Max(1, shape.Dimensions)).Select(k =>
        {
            double half = Math.Max(shape.Extents[k] / 2, 1e-9);
            return geometry.Channels.Select(c => shape.Axes[k].Dot(c.Position - geometry.Centroid) / half).ToArray();
        })];
        List<double[]> terms = [[.. Enumerable.Repeat(1.0, n)]];
        terms.AddRange(along.Where((_, k) => n >= 4 * (k + 2)));
        if (along.Length == 1)
        {
            if (n >= 12) terms.Add(Product(along[0], along[0]));
            if (n >= 16) terms.Add(Product(along[0], Product(along[0], along[0])));
        }
        else if (n >= 8 * along.Length)
        {
            for (int a = 0; a < along.Length; a++)
            {
                for (int b = a; b < along.Length; b++) terms.Add(Product(along[a], along[b]));
            }
        }

        _terms = [.. terms];
    }

    /// <summary>Takes the trend out of <paramref name="evidence"/>, and sets its floors from the trusted channels.</summary>
    public void Remove(BinEvidence evidence, bool[] trusted)
    {
        int[] index = [.. Enumerable.Range(0, trusted.Length).Where(i => trusted[i] && evidence.StandardError[i] < 1)];
        Array.Clear(evidence.PhaseTrend);
        evidence.CommonLogGain = 0;
        if (index.Length < 3) return;
        double level = Median([.. index.Select(i => evidence.LogGain[i])]);
        double sine = 0, cosine = 0;
        foreach (int i in index)
        {
            sine += Math.Sin(evidence.Phase[i]);
            cosine += Math.Cos(evidence.Phase[i]);
        }

        double common = Math.Atan2(sine, cosine);
        double[] relative = [.. evidence.Phase.Select(p => Wrap(p - common))];
        double[] trend = Fit(index, relative, evidence.StandardError);
        evidence.CommonLogGain = level;
        for (int i = 0; i < trusted.Length; i++)
        {
            evidence.PhaseTrend[i] = Wrap(common + trend[i]);
            if (trusted[i]) Apply(evidence, i);
        }

        evidence.PhaseFloor = Floor([.. index.Select(i => evidence.Phase[i])], [.. index.Select(i => evidence.StandardError[i])], 0.01);
        evidence.LogGainFloor = Floor([.. index.Select(i => evidence.LogGain[i])], [.. index.Select(i => evidence.StandardError[i])], 0.02);
    }

    /// <summary>Takes the trend that the trusted channels show out of the other channels and their places.</summary>
    public static void RemoveFromOthers(BinEvidence evidence)
    {
        if (evidence.Places is not { } places) return;
        double gain = Math.Exp(evidence.CommonLogGain);
        for (int m = 0; m < places.Channels.Length; m++)
        {
            int channel = places.Channels[m];
            Apply(evidence, channel);
            System.Numerics.Complex back = System.Numerics.Complex.FromPolarCoordinates(gain, -evidence.PhaseTrend[channel]);
            for (int r = 0; r < places.Channels.Length; r++) places.Cross[r, m] *= back;
            places.Predicted[m] *= gain * gain;
            places.Unpredicted[m] *= gain * gain;
        }
    }

    private static void Apply(BinEvidence evidence, int channel)
    {
        evidence.LogGain[channel] -= evidence.CommonLogGain;
        evidence.Phase[channel] = Wrap(evidence.Phase[channel] - evidence.PhaseTrend[channel]);
        evidence.ExpectedLevel[channel] *= Math.Exp(2 * evidence.CommonLogGain);
    }

    /// <summary>Wraps an angle to ±π.</summary>
    internal static double Wrap(double angle) => Math.IEEERemainder(angle, 2 * Math.PI);

    internal static double Median(double[] values)
    {
        if (values.Length == 0) return 0;
        Array.Sort(values);
        return values.Length % 2 == 1 ? values[values.Length / 2] : 0.5 * (values[(values.Length / 2) - 1] + values[values.Length / 2]);
    }

    // Spread beyond what the standard errors explain; the median of |x| is 0.6745 standard deviations of a normal law.
    private static double Floor(double[] values, double[] errors, double least)
    {
        double centre = Median([.. values]);
        double spread = Median([.. values.Select(v => Math.Abs(v - centre))]) / 0.6745, expected = Median([.. errors]);
        return Math.Max(least, Math.Sqrt(Math.Max(0, (spread * spread) - (expected * expected))));
    }

    private double[] Fit(int[] index, double[] values, double[] errors)
    {
        int t = _terms.Length;
        double[] coefficients = new double[t];
        double floor = 0.02;
        for (int pass = 0; pass < Reweightings; pass++)
        {
            double[] normal = new double[t * t], right = new double[t];
            foreach (int i in index)
            {
                double scale = Math.Sqrt((errors[i] * errors[i]) + (floor * floor));
                double residual = values[i] - Value(coefficients, i);
                double w = 1 / (scale * scale);
                if (pass > 0 && Math.Abs(residual) > Huber * scale) w *= Huber * scale / Math.Abs(residual);
                for (int a = 0; a < t; a++)
                {
                    right[a] += w * _terms[a][i] * values[i];
                    for (int b = 0; b < t; b++) normal[(a * t) + b] += w * _terms[a][i] * _terms[b][i];
                }
            }

            for (int a = 0; a < t; a++) normal[(a * t) + a] *= 1 + 1e-9;
            if (!RealCholesky.TryFactor(normal, t)) break;
            RealCholesky.Solve(normal, t, right);
            coefficients = right;
            floor = Math.Max(0.02, Median([.. index.Select(i => Math.Abs(values[i] - Value(coefficients, i)))]) / 0.6745);
        }

        return [.. Enumerable.Range(0, values.Length).Select(i => Value(coefficients, i))];
    }

    private double Value(double[] coefficients, int channel)
    {
        double sum = 0;
        for (int a = 0; a < coefficients.Length; a++) sum += coefficients[a] * _terms[a][channel];
        return sum;
    }

    private static double[] Product(double[] a, double[] b) => [.. a.Zip(b, (x, y) => x * y)];
}
