using System.Globalization;
using System.Text;

namespace ArrayWatch.Trials;

/// <summary>One row for each nuisance: false alerts, and the rate for an array and month of 30 days.</summary>
internal static class HealthyTable
{
    private const double MonthSeconds = 30 * 86400.0;

    public static string Format(IReadOnlyList<TrialOutcome> outcomes)
    {
        StringBuilder text = new();
        text.AppendLine("nuisance            scenes   hours  with false  false alerts  per month  not understood  ms   as");
        foreach (IGrouping<string, TrialOutcome> nuisance in outcomes.Where(o => o.Case.Fault is null).GroupBy(o => o.Case.Name))
        {
            TrialOutcome[] all = [.. nuisance];
            double seconds = all.Sum(o => o.WatchedSeconds);
            int alerts = all.Sum(o => o.Raised.Count);
            string kinds = string.Join(", ", all.SelectMany(o => o.Raised).GroupBy(r => r.Finding.Kind).OrderByDescending(g => g.Count()).Select(g => $"{g.Key} {g.Count()}"));
            text.AppendLine(string.Create(CultureInfo.InvariantCulture,
                $"{nuisance.Key,-18} {all.Length,7} {seconds / 3600,7:0.0} {all.Count(o => o.Raised.Count > 0),11} {alerts,13} {alerts * MonthSeconds / seconds,10:0.0} {all.Count(o => !o.Last.Field.Understood),15} {all.Average(o => o.MillisecondsPerDecision),3:0}   {kinds}"));
        }

        return text.ToString();
    }
}
