namespace ArrayWatch.Detection.Fitting;

/// <summary>Which law a channel's phases follow over the bins.</summary>
internal enum PhaseLaw
{
    /// <summary>None beyond the model's error.</summary>
    None,

    /// <summary>The same in every bin.</summary>
    Constant,

    /// <summary>Proportional to frequency.</summary>
    Delay,

    /// <summary>A half turn in every bin.</summary>
    Reversed,

    /// <summary>A constant and a delay together.</summary>
    Both,
}

/// <summary>
/// One channel's phases over the bins, fitted by each law: φ(f) = 0, π, φ₀, 2πfτ, φ₀ + 2πfτ. Costs are half sums of squares
/// with Huber's bound, so that a bin gone astray does not rule.
/// </summary>
internal sealed class PhaseFit
{
    private const double Bound = 3;

    // A law with one more unknown must earn this much, in nats; with two unknowns twice.
    private const double PriceOfUnknown = 4;

    // Half a sum of squares this far above its mean is no surprise.
    private const double Quiet = 6;

    private readonly double[] _frequencies;
    private readonly double[] _phases;
    private readonly double[] _errors;

    public PhaseFit(double[] frequencies, double[] phases, double[] errors)
    {
        (_frequencies, _phases, _errors) = (frequencies, phases, errors);
        double weight = 0, weightedSquare = 0;
        for (int f = 0; f < phases.Length; f++)
        {
            double w = 1 / (errors[f] * errors[f]);
            weight += w;
            weightedSquare += w * Radians(f, 1) * Radians(f, 1);
        }

        CostNone = Cost(0, 0);
        CostReversed = Cost(Math.PI, 0);
        ConstantRadians = Refine(Start(0), 0, Unknowns.Constant).Constant;
        CostConstant = Cost(ConstantRadians, 0);
        ConstantError = 1 / Math.Sqrt(Math.Max(weight, 1e-12));
        DelayError = 1 / Math.Sqrt(Math.Max(weightedSquare, 1e-12));
        if (CostNone < phases.Length + Quiet)
        {
            // Nothing to explain: a small delay is found from zero, without a search.
            DelaySeconds = Refine(0, 0, Unknowns.Delay).Delay;
            CostDelay = Cost(0, DelaySeconds);
            (BothConstant, BothDelay, CostBoth) = (0, DelaySeconds, CostDelay);
        }
        else
        {
            (DelaySeconds, CostDelay) = BestDelay(constant: false, out _);
            (double tau, CostBoth) = BestDelay(constant: true, out double both);
            (BothConstant, BothDelay) = (both, tau);
        }

        Law = Choose();
    }

    public double CostNone { get; }

    public double CostReversed { get; }

    public double CostConstant { get; }

    public double CostDelay { get; }

    public double CostBoth { get; }

    /// <summary>φ₀ when there is no delay, radians.</summary>
    public double ConstantRadians { get; }

    public double ConstantError { get; }

    /// <summary>Lateness when there is no constant, seconds: the phase falls as −2πfτ.</summary>
    public double DelaySeconds { get; }

    public double DelayError { get; }

    public double BothConstant { get; }

    public double BothDelay { get; }

    public PhaseLaw Law { get; }

    /// <summary>Phase of the chosen law at a frequency, radians.</summary>
    public double At(double frequency)
    {
        (double constant, double delay) = Law switch
        {
            PhaseLaw.Reversed => (Math.PI, 0.0),
            PhaseLaw.Constant => (ConstantRadians, 0.0),
            PhaseLaw.Delay => (0.0, DelaySeconds),
            PhaseLaw.Both => (BothConstant, BothDelay),
            _ => (0.0, 0.0),
        };
        return constant - (2 * Math.PI * frequency * delay);
    }

    private enum Unknowns
    {
        Constant,
        Delay,
        Both,
    }

    private double Radians(int f, double seconds) => -2 * Math.PI * _frequencies[f] * seconds;

    private PhaseLaw Choose()
    {
        (PhaseLaw Law, double Cost)[] laws =
        [
            (PhaseLaw.None, CostNone),
            (PhaseLaw.Reversed, CostReversed),
            (PhaseLaw.Constant, CostConstant + PriceOfUnknown),
            (PhaseLaw.Delay, CostDelay + PriceOfUnknown),
            (PhaseLaw.Both, CostBoth + (3 * PriceOfUnknown)),
        ];
        return laws.MinBy(l => l.Cost).Law;
    }

    private double Cost(double constant, double delay)
    {
        double sum = 0;
        for (int f = 0; f < _phases.Length; f++)
        {
            double r = Math.Abs(ApertureTrend.Wrap(_phases[f] - constant - Radians(f, delay))) / _errors[f];
            sum += r <= Bound ? 0.5 * r * r : Bound * (r - (0.5 * Bound));
        }

        return sum;
    }

    private double Start(double delay)
    {
        double s = 0, c = 0;
        for (int f = 0; f < _phases.Length; f++)
        {
            double w = 1 / (_errors[f] * _errors[f]), p = _phases[f] - Radians(f, delay);
            s += w * Math.Sin(p);
            c += w * Math.Cos(p);
        }

        return Math.Atan2(s, c);
    }

    private (double Constant, double Delay) Refine(double constant, double delay, Unknowns unknowns)
    {
        for (int pass = 0; pass < 6; pass++)
        {
            double a = 0, b = 0, d = 0, p = 0, q = 0;
            for (int f = 0; f < _phases.Length; f++)
            {
                double r = ApertureTrend.Wrap(_phases[f] - constant - Radians(f, delay)), w = 1 / (_errors[f] * _errors[f]);
                if (Math.Abs(r) > Bound * _errors[f]) w *= Bound * _errors[f] / Math.Abs(r);
                double slope = Radians(f, 1);
                a += w;
                b += w * slope;
                d += w * slope * slope;
                p += w * r;
                q += w * slope * r;
            }

            if (unknowns == Unknowns.Constant) constant += p / a;
            else if (unknowns == Unknowns.Delay) delay += d > 0 ? q / d : 0;
            else
            {
                double det = (a * d) - (b * b);
                if (det <= 1e-12 * a * d) break;
                constant += ((d * p) - (b * q)) / det;
                delay += ((a * q) - (b * p)) / det;
            }
        }

        return (ApertureTrend.Wrap(constant), delay);
    }

    private (double Delay, double Cost) BestDelay(bool constant, out double constantRadians)
    {
        constantRadians = 0;
        int bins = _phases.Length;
        if (bins == 0) return (0, 0);
        double top = _frequencies[^1], gap = top;
        for (int f = 1; f < bins; f++) gap = Math.Min(gap, _frequencies[f] - _frequencies[f - 1]);
        double reach = Math.Min(0.45 / gap, 0.05), step = 1 / (12 * top);
        int steps = Math.Min(600, (int)(reach / step));
        double best = 0, least = double.PositiveInfinity;
        for (int k = -steps; k <= steps; k++)
        {
            double tau = k * step, c = constant ? Start(tau) : 0, cost = Cost(c, tau);
            if (cost < least - 1e-12) (least, best, constantRadians) = (cost, tau, c);
        }

        (double c2, double t2) = Refine(constantRadians, best, constant ? Unknowns.Both : Unknowns.Delay);
        double refined = Cost(constant ? c2 : 0, t2);
        if (refined < least) (least, best, constantRadians) = (refined, t2, constant ? c2 : 0);
        return (best, least);
    }
}
