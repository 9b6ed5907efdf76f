using System.Numerics;
using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>
/// Channels carry each other's data. Every untrusted channel's data are tried at every untrusted place, over all bins; the
/// permutation of largest likelihood is found, and each of its cycles must beat the best that phases, delays and
/// gains at the channels' own places can do.
/// </summary>
internal sealed class SwapHypothesis : IFaultHypothesis
{
    // Relative error that a healthy response may have: about 1 dB and 6°.
    private const double Caution = 0.1;

    // An exchange has no free number, a phase or delay has: it may be this much worse and still be the simpler explanation.
    private const double SimplerNats = 8;
    private const double SimplerShare = 0.02;

    // Moved data must have at least this share of the coherence that a healthy channel has with the prediction at its place.
    private const double LeastCoherenceKept = 0.5;

    public void Propose(DecisionScene scene)
    {
        BinEvidence[] bins = [.. scene.Bins.Where(b => b.Usable && b.Places is not null)];
        ChannelSummary[] suspects = [.. scene.Unexplained];
        if (bins.Length == 0 || suspects.Length < 2) return;
        int[] places = bins[0].Places!.Channels;
        int[] rows = [.. suspects.Select(s => Array.IndexOf(places, s.Index)).Where(r => r >= 0)];
        if (rows.Length < 2) return;
        double bonus = SimplerNats + (SimplerShare * bins.Sum(b => b.Places!.Snapshots));
        double[,] score = new double[rows.Length, rows.Length];
        double[] healthy = new double[rows.Length], own = new double[rows.Length];
        for (int a = 0; a < rows.Length; a++)
        {
            for (int b = 0; b < rows.Length; b++) score[a, b] = Likelihood(bins, rows[a], rows[b], null);
            healthy[a] = score[a, a];
            double silent = -bins.Sum(b => b.Places!.Snapshots * Math.Log(b.Places.Level[rows[a]] + double.Epsilon));
            own[a] = Math.Max(Math.Max(score[a, a], silent), Likelihood(bins, rows[a], rows[a], scene.Summaries[places[rows[a]]]));
            score[a, a] = own[a] - bonus;
        }

        int[] assignment = Assignment.Maximise(score);
        bool[] visited = new bool[rows.Length];
        for (int a = 0; a < rows.Length; a++)
        {
            if (visited[a] || assignment[a] == a) continue;
            List<int> cycle = [];
            for (int k = a; !visited[k]; k = assignment[k])
            {
                visited[k] = true;
                cycle.Add(k);
            }

            Judge(scene, bins, places, rows, cycle, assignment, score, healthy, own);
        }
    }

    private static void Judge(
        DecisionScene scene, BinEvidence[] bins, int[] places, int[] rows, List<int> cycle, int[] assignment,
        double[,] score, double[] healthy, double[] own)
    {
        double moved = cycle.Sum(k => score[k, assignment[k]]);
        double nats = moved - cycle.Sum(k => healthy[k]);
        double kept = cycle.Min(k => CoherenceKept(bins, rows[k], rows[assignment[k]]));
        if (nats <= 0 || kept < LeastCoherenceKept) return;
        Dictionary<int, int> mapping = cycle.ToDictionary(k => places[rows[k]], k => places[rows[assignment[k]]]);
        scene.Claim(new Candidate
        {
            Kind = "swap",
            Indices = [.. mapping.Keys.Order()],
            Nats = nats,
            Estimate = new Dictionary<string, object> { ["mapping"] = mapping },
            Evidence = new Dictionary<string, double>
            {
                ["against no fault, nats"] = nats,
                ["against phases, delays and gains, nats"] = moved - cycle.Sum(k => own[k]),
                ["share of expected coherence kept at the new places"] = kept,
            },
        });
    }

    private static double CoherenceKept(BinEvidence[] bins, int row, int column)
    {
        double kept = 0, expected = 0;
        foreach (PlaceTable t in bins.Select(b => b.Places!))
        {
            Complex cross = t.Cross[row, column];
            kept += ((cross.Real * cross.Real) + (cross.Imaginary * cross.Imaginary)) / ((t.Level[row] * t.Predicted[column]) + double.Epsilon);
            expected += t.Predicted[column] / (t.Predicted[column] + t.Unpredicted[column]);
        }

        return expected > 0 ? kept / expected : 0;
    }

    // Profile log-likelihood over the residual power: Σ −ν ln r.
    private static double Likelihood(BinEvidence[] bins, int row, int column, ChannelSummary? law)
    {
        double sum = 0;
        foreach (BinEvidence b in bins) sum -= b.Places!.Snapshots * Math.Log(b.Places!.Residual(row, column, law is null ? Complex.One : Complex.FromPolarCoordinates(Math.Exp(law.GainNepers), law.Phase.At(b.Frequency)), Caution));
        return sum;
    }
}
