using System.Numerics;
using ArrayWatch.NoiseField;
using ArrayWatch.NoiseField.Fitting;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// One bin over time: the field's powers and the channels' calibration, each decision starting from the last.
/// </summary>
internal sealed class BinTracker
{
    private readonly ArrayGeometry _geometry;
    private readonly double[] _logGain;
    private readonly double[] _phase;
    private FieldPowers? _powers;

    public BinTracker(ArrayGeometry geometry, double frequency)
    {
        _geometry = geometry;
        Frequency = frequency;
        _logGain = new double[geometry.Count];
        _phase = new double[geometry.Count];
        Evidence = new BinEvidence(geometry.Count) { Frequency = frequency };
    }

    public double Frequency { get; }

    public BinEvidence Evidence { get; }

    public FieldPowers? Powers => _powers;

    public ReadOnlySpan<double> LogGain => _logGain;

    public ReadOnlySpan<double> Phase => _phase;

    /// <summary>Takes a basis whose grid differs; powers move to the nearest atoms.</summary>
    public void Rebase(FieldBasis basis)
    {
        FieldPowers next = new(basis);
        if (_powers is { } old)
        {
            old.ChannelNoise.CopyTo(next.ChannelNoise, 0);
            if (old.Dense.Length == next.Dense.Length) old.Dense.CopyTo(next.Dense, 0);
            for (int q = 0; q < old.Waves.Length; q++)
            {
                if (old.Waves[q] > 0) next.Waves[Nearest(basis, old.Basis.Directions[q])] += old.Waves[q];
            }
        }

        _powers = next;
    }

    /// <summary>Fits field and calibration to <paramref name="work"/>'s raw data, alternating.</summary>
    /// <param name="work">Holds the raw covariance in <paramref name="raw"/>; left with the fit.</param>
    /// <param name="raw">S, N×N.</param>
    /// <param name="snapshots">ν.</param>
    /// <param name="trusted">Channels that count.</param>
    /// <param name="rounds">Alternations.</param>
    /// <returns>False when the data allow no fit.</returns>
    public bool TryFit(FitWorkspace work, ComplexMatrix raw, double snapshots, bool[] trusted, int rounds)
    {
        FieldPowers powers = _powers ?? throw new InvalidOperationException("a bin is fitted before it has a basis");
        WeightedMatching matching = new(work);
        CalibrationStep calibration = new(work);
        for (int i = 0; i < trusted.Length; i++)
        {
            if (trusted[i]) continue;
            _logGain[i] = _phase[i] = 0;
        }

        for (int round = 0; round < rounds; round++)
        {
            TakeOutGains(raw, work.Data);
            if (!matching.TryFit(powers, trusted, round == 0 ? 2 : 1)) return false;
            calibration.Apply(powers.ChannelNoise, trusted, snapshots, _logGain, _phase);
        }

        TakeOutGains(raw, work.Data);
        return matching.TryFit(powers, trusted, 1);
    }

    /// <summary>Puts newer data into the fitted workspace, the field staying as it is.</summary>
    public void Load(FitWorkspace work, ComplexMatrix raw, bool[] trusted)
    {
        TakeOutGains(raw, work.Data);
        TrustedInverse.TryUpdate(work, _powers!.ChannelNoise, trusted);
    }

    /// <summary>A pattern in the units of calibrated data, in those of the raw data.</summary>
    public Complex[] GivePattern(Complex[] pattern) =>
        [.. pattern.Select((p, i) => p * Complex.FromPolarCoordinates(Math.Exp(_logGain[i]), _phase[i]))];

    private void TakeOutGains(ComplexMatrix raw, ComplexMatrix data)
    {
        int n = _geometry.Count;
        Span<double> re = n <= 512 ? stackalloc double[n] : new double[n], im = n <= 512 ? stackalloc double[n] : new double[n];
        for (int i = 0; i < n; i++)
        {
            double a = Math.Exp(-_logGain[i]);
            (double s, double c) = Math.SinCos(-_phase[i]);
            (re[i], im[i]) = (a * c, a * s);
        }

        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
            {
                int at = (i * n) + j;
                double sr = raw.Re[at], si = raw.Im[at];
                double gr = (re[i] * re[j]) + (im[i] * im[j]), gi = (im[i] * re[j]) - (re[i] * im[j]);
                data.Re[at] = (sr * gr) - (si * gi);
                data.Im[at] = (sr * gi) + (si * gr);
            }
        }
    }

    private static int Nearest(FieldBasis basis, Position direction)
    {
        int best = 0;
        double most = double.NegativeInfinity;
        for (int q = 0; q < basis.Directions.Length; q++)
        {
            double c = basis.Directions[q].Dot(direction);
            if (c > most) (most, best) = (c, q);
        }

        return best;
    }
}
