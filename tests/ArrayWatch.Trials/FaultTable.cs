using System.Globalization;
using System.Text;

namespace ArrayWatch.Trials;

/// <summary>One row for each kind of fault, and what misnamed trials were called.</summary>
internal static class FaultTable
{
    public static string Format(IReadOnlyList<TrialOutcome> outcomes)
    {
        StringBuilder text = new();
        text.AppendLine("kind                trials  found  named  exact  clean  false   delay s 50 % / 90 %   error mean / rms   error/σ rms  ms   called otherwise");
        foreach (IGrouping<string, TrialOutcome> kind in outcomes.Where(o => o.Case.Fault is not null).GroupBy(o => o.Case.Name))
        {
            TrialOutcome[] all = [.. kind];
            double[] delays = [.. all.Where(o => o.Right is not null).Select(o => o.Right!.SceneSeconds - o.Case.Fault!.StartSeconds).Order()];
            EstimateError[] errors = [.. all.Select(EstimateError.Of).OfType<EstimateError>()];
            string named = string.Join(", ", all.SelectMany(o => o.About.Where(r => r.Finding.Kind != o.Case.Fault!.Kind).Select(r => r.Finding.Kind).Distinct())
                .GroupBy(k => k).OrderByDescending(g => g.Count()).Select(g => $"{g.Key} {g.Count()}"));
            text.AppendLine(string.Create(CultureInfo.InvariantCulture,
                $"{kind.Key,-18} {all.Length,7} {Share(all, o => o.About.Any())} {Share(all, o => o.Right is not null)} {Share(all, o => o.IsExact)} {Share(all, o => o.IsClean)} {all.Sum(o => o.False.Count()),6}   {Quantile(delays, 0.5),7:0} / {Quantile(delays, 0.9),-10:0} {Errors(errors),-24} {Spread(errors),6:0.00} {all.Average(o => o.MillisecondsPerDecision),6:0}   {named}"));
        }

        return text.ToString();
    }

    private static string Share(TrialOutcome[] all, Func<TrialOutcome, bool> isSo) =>
        string.Create(CultureInfo.InvariantCulture, $"{100.0 * all.Count(isSo) / all.Length,4:0} %");

    private static double Quantile(double[] ascending, double share) =>
        ascending.Length == 0 ? double.NaN : ascending[Math.Min(ascending.Length - 1, (int)(share * ascending.Length))];

    private static string Errors(EstimateError[] errors) => errors.Length == 0 ? "–" : string.Create(
        CultureInfo.InvariantCulture,
        $"{errors.Average(e => e.Error),7:0.00} / {Math.Sqrt(errors.Average(e => e.Error * e.Error)):0.00} {errors[0].Unit}");

    private static double Spread(EstimateError[] errors) =>
        errors.Length == 0 ? double.NaN : Math.Sqrt(errors.Average(e => e.Error * e.Error / (e.StandardError * e.StandardError)));
}
