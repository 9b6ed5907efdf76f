using System.Numerics;
using ArrayWatch.NoiseField.Fitting;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// Compares each channel with what the trusted others predict at its place, for one bin.
/// </summary>
/// <remarks>
/// For a trusted channel n, with z = W x and W = (R_TT)⁻¹, the others' prediction is y_n = x_n − z_n/W_nn, so that
/// E[x_n y_n*] = S_nn − (S W)_nn/W_nn and E|x_n − y_n|² = (W S W)_nn/W_nn². For another channel m the prediction is
/// y_m = r_mᴴ W x_T, r_m being the model's covariance of the trusted channels with a sensor at m's place. The
/// regression of x_n on y_n gives the response g = E[x y*]/E|y|² whatever its size; its relative variance is
/// (E|x|²−|E x y*|²/E|y|²)/(ν |g|² E|y|²), half in each quadrature (Brillinger, Time Series, 1981, §8.6).
/// </remarks>
internal sealed class ChannelPrediction
{
    private readonly FitWorkspace _work;
    private readonly int _n;

    public ChannelPrediction(FitWorkspace work)
    {
        _work = work;
        _n = work.Channels;
    }

    /// <summary>Fills <paramref name="evidence"/> for the trusted channels from the fitted workspace.</summary>
    /// <param name="tracker">The bin.</param>
    /// <param name="trusted">Channels that were fitted.</param>
    /// <param name="snapshots">ν of the workspace's data.</param>
    /// <param name="evidence">Receives what the bin says.</param>
    public void Evaluate(BinTracker tracker, bool[] trusted, double snapshots, BinEvidence evidence)
    {
        FieldPowers powers = tracker.Powers!;
        double usual = UsualNoise(powers, trusted);
        for (int i = 0; i < _n; i++)
        {
            if (!trusted[i]) continue;
            double weight = _work.Weight.Re[(i * _n) + i];
            double level = _work.Data.Re[(i * _n) + i];
            Complex cross = level - (new Complex(_work.WeightData.Re[(i * _n) + i], -_work.WeightData.Im[(i * _n) + i]) / weight);
            double remains = _work.WeightDataWeight.Re[(i * _n) + i] / (weight * weight);
            double predicted = Math.Max(remains - level + (2 * cross.Real), 1e-9 * level);
            double unpredicted = Math.Max(0, (1 / weight) - powers.ChannelNoise[i]) + usual;
            Complex own = Complex.FromPolarCoordinates(Math.Exp(tracker.LogGain[i]), tracker.Phase[i]);
            evidence.Snapshots[i] = snapshots;
            Fill(evidence, i, level, cross, predicted, unpredicted, own, Math.Exp(2 * tracker.LogGain[i]), usual);
        }
    }

    /// <summary>Fills <paramref name="evidence"/> for the channels that are not trusted, from the workspace's data, which may be newer than the fit.</summary>
    /// <param name="tracker">The bin.</param>
    /// <param name="trusted">Channels that were fitted.</param>
    /// <param name="snapshots">ν of the workspace's data.</param>
    /// <param name="evidence">Receives what the bin says.</param>
    public void EvaluateOthers(BinTracker tracker, bool[] trusted, double snapshots, BinEvidence evidence)
    {
        int[] others = [.. Enumerable.Range(0, _n).Where(i => !trusted[i])];
        evidence.Places = null;
        if (others.Length == 0) return;
        double usual = UsualNoise(tracker.Powers!, trusted);
        PlaceTable table = Places(others, usual);
        table.Snapshots = snapshots;
        evidence.Places = table;
        for (int a = 0; a < others.Length; a++)
        {
            evidence.Snapshots[others[a]] = snapshots;
            Fill(evidence, others[a], table.Level[a], table.Cross[a, a], table.Predicted[a], table.Unpredicted[a], Complex.One, 1, usual);
        }
    }

    private double UsualNoise(FieldPowers powers, bool[] trusted)
    {
        double[] noises = [.. Enumerable.Range(0, _n).Where(i => trusted[i]).Select(i => powers.ChannelNoise[i]).Order()];
        return noises[noises.Length / 2];
    }

    private void Fill(
        BinEvidence e, int i, double level, Complex cross, double predicted, double unpredicted, Complex own, double ownPower, double usual)
    {
        double crossPower = (cross.Real * cross.Real) + (cross.Imaginary * cross.Imaginary);
        Complex gain = cross / predicted;
        double remains = Math.Max(level - (crossPower / predicted), 1e-9 * level);
        double gainPower = crossPower / (predicted * predicted);
        e.LogGain[i] = (0.5 * Math.Log(Math.Max(gainPower, 1e-20))) + (0.5 * Math.Log(ownPower));
        e.Phase[i] = (gain * own).Phase;
        e.StandardError[i] = level > 0 ? Math.Min(10, Math.Sqrt(remains / (2 * e.Snapshots[i] * predicted * Math.Max(gainPower, 1e-12)))) : 10;
        e.Coherence[i] = level > 0 ? Math.Min(1, crossPower / (predicted * level)) : 0;
        double healthy = predicted + unpredicted;
        e.ExpectedCoherence[i] = predicted / healthy;
        e.Level[i] = level * ownPower;
        e.ExpectedLevel[i] = _work.Field.Re[(i * _n) + i] + usual;
        e.ResidualRatio[i] = remains / (Math.Max(gainPower, 1e-12) * unpredicted);
    }

    private PlaceTable Places(int[] others, double usual)
    {
        int count = others.Length;
        PlaceTable table = new(others);
        ComplexMatrix model = new(count, _n), rows = new(count, _n), products = new(count, _n);
        for (int a = 0; a < count; a++)
        {
            // Row a: the model's covariance of a sensor at that place with every channel; W is zero but for trusted ones.
            _work.Field.Re.AsSpan(others[a] * _n, _n).CopyTo(model.Re.AsSpan(a * _n));
            _work.Field.Im.AsSpan(others[a] * _n, _n).CopyTo(model.Im.AsSpan(a * _n));
        }

        Products.Multiply(model, _work.Weight, rows);
        Products.Multiply(rows, _work.Data, products);
        for (int m = 0; m < count; m++)
        {
            double predicted = 0, known = 0;
            for (int k = 0; k < _n; k++)
            {
                int at = (m * _n) + k;
                predicted += (products.Re[at] * rows.Re[at]) + (products.Im[at] * rows.Im[at]);
                known += (rows.Re[at] * model.Re[at]) + (rows.Im[at] * model.Im[at]);
            }

            double level = _work.Data.Re[(others[m] * _n) + others[m]];
            table.Predicted[m] = Math.Max(predicted, 1e-9 * _work.Field.Re[(others[m] * _n) + others[m]]) + double.Epsilon;
            table.Level[m] = level;
            table.Unpredicted[m] = Math.Max(0, _work.Field.Re[(others[m] * _n) + others[m]] - known) + usual;
            for (int n = 0; n < count; n++)
            {
                // E[x_n y_m*] is the conjugate of E[y_m x_n*], which is row m of (b S′) at column n.
                int at = (m * _n) + others[n];
                table.Cross[n, m] = new Complex(products.Re[at], -products.Im[at]);
            }
        }

        return table;
    }
}
