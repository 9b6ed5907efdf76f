using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Signals;

namespace ArrayWatch.Trials;

/// <summary>Trials in words.</summary>
internal static class Telling
{
    public static void Outcome(TrialOutcome outcome, TextWriter output)
    {
        output.WriteLine($"{outcome.Case.Name} --replay {outcome.Case.StartValue}: {outcome.Case.Description}");
        foreach (Raised r in outcome.Raised) output.WriteLine($"    {Time(r.SceneSeconds)} {Finding(r.Finding)}");
        if (outcome.Raised.Count == 0) output.WriteLine("    nothing raised");
    }

    /// <summary>Findings beside the faults that a scene has on its schedule, in the order of time.</summary>
    public static void Schedule(TrialOutcome outcome, TextWriter output)
    {
        output.WriteLine(outcome.Case.Description);
        IEnumerable<(double Time, string Text)> wrong = outcome.Case.Scene.Faults.Select(f => (f.StartSeconds, $"is wrong until {Time(f.EndSeconds)}: {TrialDraw.Tell(f)}"));
        foreach ((double time, string text) in wrong.Concat(outcome.Raised.Select(r => (r.SceneSeconds, $"    raised: {Finding(r.Finding)}"))).OrderBy(e => e.Item1))
            output.WriteLine($"{Time(time)} {text}");
    }

    public static void Decision(double time, Diagnosis diagnosis, TrialCase trial, TextWriter output)
    {
        output.WriteLine(string.Create(
            CultureInfo.InvariantCulture,
            $"{Time(time)} ν {diagnosis.DegreesOfFreedom:0} misfit {diagnosis.Field.Misfit:0.000} {(diagnosis.Field.Understood ? "" : "NOT UNDERSTOOD ")}{(diagnosis.Ready ? "" : "starting ")}{string.Join(" | ", diagnosis.Findings.Select(Finding))}"));
        if (trial.Fault is not { } fault) return;
        foreach (int c in fault.Channels.Take(4))
        {
            ChannelAssessment a = diagnosis.Channels[c];
            output.WriteLine($"        {c}: {a.Standing} gain {Value(a.GainDecibels)} dB, phase {Value(a.PhaseDegrees)}°, delay {Value(a.DelayMicroseconds)} µs, excess {Value(a.ExcessDecibels)} dB");
        }
    }

    private static string Finding(Finding f) => string.Create(
        CultureInfo.InvariantCulture,
        $"{f.Kind} [{string.Join(", ", f.Indices)}] onset {Time(f.OnsetSeconds)} confidence {f.Confidence:0.0000} {string.Join(" ", f.Estimate.Select(e => $"{e.Key}={Value(e.Value)}"))}{(f.Alternatives.Count > 0 ? $" or {string.Join(", ", f.Alternatives)}" : "")}");

    private static string Time(double seconds) => string.Create(CultureInfo.InvariantCulture, $"{seconds,7:0} s");

    private static string Value(Measured? value) =>
        value is { } v ? string.Create(CultureInfo.InvariantCulture, $"{v.Value:0.00}±{v.StandardError:0.00}") : "–";

    private static string Value(object value) => value switch
    {
        double d => d.ToString("0.##", CultureInfo.InvariantCulture),
        IEnumerable<double> list => $"[{string.Join(" ", list.Select(d => d.ToString("0.#", CultureInfo.InvariantCulture)))}]",
        IReadOnlyDictionary<int, int> map => string.Join(" ", map.Select(p => $"{p.Key}→{p.Value}")),
        _ => value.ToString() ?? "",
    };
}
