using System.Numerics;
using ArrayWatch.NoiseField;
using ArrayWatch.NoiseField.Fitting;
using ArrayWatch.Signals;
using ArrayWatch.Signals.Covariance;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Signals.Statistics;

namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// All bins of one array over time: at each decision it fits the field from the channels that are trusted, and settles
/// which those are. A channel leaves the trusted set when it deviates, the worst first, because one bad
/// channel spoils what is predicted for its neighbours; it returns when it does not.
/// </summary>
internal sealed class FieldTracker
{
    private const int MostPasses = 8;
    private const double Leaves = 1.0;
    private const double Returns = 0.8;
    private const double LeastRecent = 12;

    // A pattern that was found is held down to this share of the threshold, so that it does not come and go with chance.
    private const double StaysForeign = 0.65;

    // One or two plane waves make this much of any arrival that the grid may have missed.
    private const double ExplainedByWaves = 0.85;

    private readonly ArrayGeometry _geometry;
    private readonly ArrayShape _shape;
    private readonly IReadOnlyList<IFieldComponent> _components;
    private readonly Tolerances _tolerances;
    private readonly ApertureTrend _trend;
    private readonly FitWorkspace _work;
    private readonly ComplexMatrix _raw;
    private BinTracker[] _bins = [];
    private double _soundSpeed;
    private double _threshold;
    private double _thresholdSnapshots;
    private int _thresholdChannels;

    public FieldTracker(ArrayGeometry geometry, IReadOnlyList<IFieldComponent> components, Tolerances tolerances)
    {
        _geometry = geometry;
        _shape = new ArrayShape(geometry);
        _components = components;
        _tolerances = tolerances;
        _trend = new ApertureTrend(geometry, _shape);
        _work = new FitWorkspace(geometry.Count);
        _raw = new ComplexMatrix(geometry.Count, geometry.Count);
        Trusted = new bool[geometry.Count];
        Array.Fill(Trusted, true);
        Summaries = [];
    }

    /// <summary>Channels that the field is fitted from.</summary>
    public bool[] Trusted { get; }

    public IReadOnlyList<BinTracker> Bins => _bins;

    public ChannelSummary[] Summaries { get; private set; }

    /// <summary>Fits everything to <paramref name="estimate"/>.</summary>
    /// <returns>False when the data allow no fit.</returns>
    public bool TryUpdate(
        ExponentialCovariance estimate, ExponentialCovariance recent, IReadOnlyList<double> frequencies, double soundSpeed, IReadOnlySet<int> outOfService)
    {
        bool first = Prepare(frequencies, soundSpeed);
        double snapshots = estimate.DegreesOfFreedom;
        foreach (int i in outOfService) Trusted[i] = false;
        if (first) ScreenLevels(estimate);
        HashSet<int> left = [];
        for (int pass = 0; pass < MostPasses; pass++)
        {
            if (!FitBins(estimate, soundSpeed, snapshots, first && pass == 0 ? 4 : 2)) return false;
            Summaries = [.. Enumerable.Range(0, _geometry.Count).Select(Summarise)];
            if (!Settle(outOfService, left)) break;
        }

        if (recent.DegreesOfFreedom >= LeastRecent) JudgeOthersBy(recent);
        return true;
    }

    private ChannelSummary Summarise(int channel) => new(channel, [.. _bins.Select(b => b.Evidence)], _tolerances);

    // What a channel does now shows in the recent memory, without the mixture of before and after that the fast one still holds.
    private void JudgeOthersBy(ExponentialCovariance recent)
    {
        if (Array.TrueForAll(Trusted, t => t)) return;
        ChannelPrediction prediction = new(_work);
        foreach (var (bin, f) in _bins.Select((b, f) => (b, f)))
        {
            if (!bin.Evidence.Usable) continue;
            recent.CopyBin(f, _raw);
            bin.Powers!.WriteField(_work.Field);
            bin.Load(_work, _raw, Trusted);
            prediction.EvaluateOthers(bin, Trusted, recent.DegreesOfFreedom, bin.Evidence);
            ApertureTrend.RemoveFromOthers(bin.Evidence);
        }

        for (int i = 0; i < Trusted.Length; i++)
        {
            if (!Trusted[i]) Summaries[i] = Summarise(i);
        }
    }

    private bool Prepare(IReadOnlyList<double> frequencies, double soundSpeed)
    {
        bool first = _bins.Length != frequencies.Count || !_bins.Select(b => b.Frequency).SequenceEqual(frequencies);
        if (first)
        {
            _bins = [.. frequencies.Select(f => new BinTracker(_geometry, f))];
            Array.Fill(Trusted, true);
        }

        if (first || Math.Abs(soundSpeed - _soundSpeed) > 2e-4 * soundSpeed)
        {
            foreach (BinTracker b in _bins) b.Rebase(Basis(b.Frequency, soundSpeed, [], 0));
            _soundSpeed = soundSpeed;
        }

        return first;
    }

    private FieldBasis Basis(double frequency, double soundSpeed, IReadOnlyList<Position> hints, double spacing) =>
        new(new FieldContext(_geometry, _shape, frequency, soundSpeed, hints, spacing), _components);

    // At the very first a channel far from the usual level is kept out of the fit: it returns if it fits.
    private void ScreenLevels(ExponentialCovariance estimate)
    {
        int n = _geometry.Count;
        double[] levels = new double[n];
        for (int f = 0; f < _bins.Length; f++)
        {
            estimate.CopyBin(f, _raw);
            double[] own = [.. Enumerable.Range(0, n).Select(i => 10 * Math.Log10(Math.Max(_raw.Re[(i * n) + i], 1e-300)))];
            double median = ApertureTrend.Median([.. own]);
            for (int i = 0; i < n; i++) levels[i] += (own[i] - median) / _bins.Length;
        }

        for (int i = 0; i < n; i++) Trusted[i] &= Math.Abs(levels[i]) < 10;
    }

    private bool FitBins(ExponentialCovariance estimate, double soundSpeed, double snapshots, int rounds)
    {
        ChannelPrediction prediction = new(_work);
        IReadOnlyList<Position> hints = [];
        double spacing = 0;
        bool any = false;
        foreach (var (bin, f) in _bins.Select((b, f) => (b, f)))
        {
            estimate.CopyBin(f, _raw);
            if (_shape.Dimensions >= 2 && hints.Count > 0) bin.Rebase(Basis(bin.Frequency, soundSpeed, hints, spacing));
            bin.Evidence.Usable = bin.TryFit(_work, _raw, snapshots, Trusted, rounds);
            if (!bin.Evidence.Usable) continue;
            any = true;
            if (_shape.Dimensions >= 2) (hints, spacing) = (bin.Powers!.ActiveDirections(0.03, 8), bin.Powers.Basis.Spacing);
            SearchForeign(bin, snapshots);
            prediction.Evaluate(bin, Trusted, snapshots, bin.Evidence);
            prediction.EvaluateOthers(bin, Trusted, snapshots, bin.Evidence);
            _trend.Remove(bin.Evidence, Trusted);
            ApertureTrend.RemoveFromOthers(bin.Evidence);
            bin.Evidence.Misfit = Misfit(bin.Powers!);
        }

        if (!any) return false;
        double usual = ApertureTrend.Median([.. _bins.Where(b => b.Evidence.Usable).Select(b => b.Evidence.LargestEigenvalue)]);
        foreach (BinTracker b in _bins.Where(b => b.Evidence.Usable))
            b.Evidence.Usable = b.Evidence.Foreign is null && b.Evidence.LargestEigenvalue < 6 * Math.Max(usual, 1.5);
        return true;
    }

    private void SearchForeign(BinTracker bin, double snapshots)
    {
        ForeignSearch search = new(_work);
        double eigenvalue = search.Search(bin.Powers!, Trusted);
        bin.Evidence.LargestEigenvalue = eigenvalue;
        double ease = bin.Evidence.Foreign is null ? 1 : StaysForeign;
        bin.Evidence.Foreign = null;
        double usual = ApertureTrend.Median([.. _bins.Where(b => b != bin && b.Evidence.LargestEigenvalue > 0).Select(b => b.Evidence.LargestEigenvalue)]);
        double threshold = 1.6 * Threshold(Trusted.Count(t => t), Math.Max(snapshots, 2));
        if (eigenvalue <= ease * Math.Max(threshold, 2.5 * usual)) return;
        double waves = search.ShareOfWaves(bin.Powers!.Basis, Trusted);
        if (waves >= ExplainedByWaves) return;
        double[] power = [.. bin.GivePattern(search.Pattern).Select(p => (p.Real * p.Real) + (p.Imaginary * p.Imaginary))];
        int n = _geometry.Count;
        bin.Evidence.Foreign = new ForeignPattern(
            bin.Frequency, eigenvalue, waves, power, [.. power.Select((p, i) => p / Math.Max(_work.Field.Re[(i * n) + i], 1e-300))]);
    }

    // The exact threshold takes milliseconds, and hardly moves with ν.
    private double Threshold(int channels, double snapshots)
    {
        if (channels == _thresholdChannels && Math.Abs(snapshots - _thresholdSnapshots) < 0.1 * _thresholdSnapshots) return _threshold;
        (_thresholdChannels, _thresholdSnapshots) = (channels, snapshots);
        return _threshold = LargestEigenvalue.Threshold(channels, snapshots, 1e-6);
    }

    private double Misfit(FieldPowers powers)
    {
        int n = _geometry.Count;
        double missed = 0, whole = 0;
        for (int i = 0; i < n; i++)
        {
            if (!Trusted[i]) continue;
            for (int j = 0; j < n; j++)
            {
                if (!Trusted[j]) continue;
                int at = (i * n) + j;
                double re = _work.Data.Re[at] - _work.Field.Re[at] - (i == j ? powers.ChannelNoise[i] : 0), im = _work.Data.Im[at] - _work.Field.Im[at];
                missed += (re * re) + (im * im);
                whole += (_work.Data.Re[at] * _work.Data.Re[at]) + (_work.Data.Im[at] * _work.Data.Im[at]);
            }
        }

        return whole > 0 ? Math.Min(1, missed / whole) : 1;
    }

    // Returns true when the trusted set changed and the field must be fitted again.
    private bool Settle(IReadOnlySet<int> outOfService, HashSet<int> left)
    {
        double worst = Summaries.Where(s => Trusted[s.Index]).Select(s => s.Deviation).DefaultIfEmpty(0).Max();
        int room = Trusted.Count(t => t) - Math.Max(3, (_geometry.Count + 1) / 2);
        bool changed = false;
        foreach (ChannelSummary s in Summaries.Where(s => Trusted[s.Index]).OrderByDescending(s => s.Deviation))
        {
            if (s.Deviation < Math.Max(Leaves, 0.4 * worst) || room <= 0) break;
            Trusted[s.Index] = false;
            left.Add(s.Index);
            room--;
            changed = true;
        }

        if (changed) return true;
        foreach (ChannelSummary s in Summaries)
        {
            if (Trusted[s.Index] || outOfService.Contains(s.Index) || left.Contains(s.Index) || s.Deviation >= Returns) continue;
            Trusted[s.Index] = true;
            left.Add(s.Index);
            changed = true;
        }

        return changed;
    }
}
