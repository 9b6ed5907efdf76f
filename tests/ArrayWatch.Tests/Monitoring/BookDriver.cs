using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Alerts;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Tests.Monitoring;

/// <summary>Drives an alert book with faults written as "kind:channels:group".</summary>
internal sealed class BookDriver
{
    public const double Begin = FrameMaker.Begin;

    private static readonly DateTimeOffset Now = new(2026, 5, 1, 4, 0, 0, TimeSpan.Zero);

    private double _time = Begin;

    public AlertBook Book { get; } = new(FrameMaker.Array());

    public bool Ready { get; set; } = true;

    public Standing Standing { get; set; } = Standing.Trusted;

    public double GainDecibels { get; set; } = -6;

    public IReadOnlyDictionary<string, double>? Effect { get; set; }

    /// <summary>What changes when these faults, and no others, stand at a time.</summary>
    public IReadOnlyList<AlertEvent> At(double seconds, params string[] faults)
    {
        _time = Begin + seconds;
        ReturnEvidence evidence = new(FakeDiagnosis.Of(_time, 4, Ready, Standing), 12);
        return Book.Update(_time, [.. faults.Select(f => AlertCondition.Of(Fault(f)))], evidence, Effect);
    }

    public AlertEvent Act(string id, AlertVerb verb) => Act(id, verb, verb == AlertVerb.Shelve ? Now.AddHours(1) : null);

    public AlertEvent Act(string id, AlertVerb verb, DateTimeOffset? until) =>
        Book.Act(new AlertAction(id, verb, "Kari", "", until), _time, Now)!.Value.Alert;

    /// <summary>Brings the alert "dead:1" to a state.</summary>
    public string BringTo(AlertState state)
    {
        string id = At(0, "dead:1").Single().Id;
        switch (state)
        {
            case AlertState.Acknowledged:
                Act(id, AlertVerb.Acknowledge);
                break;
            case AlertState.ReturnedUnacknowledged:
                At(10);
                break;
            case AlertState.Shelved:
                Act(id, AlertVerb.Shelve);
                break;
            case AlertState.SuppressedByDesign:
                At(10, "dead:1", "dead:0,1:G1");
                break;
            case AlertState.OutOfService:
                Act(id, AlertVerb.OutOfService);
                break;
        }

        return id;
    }

    private Finding Fault(string text)
    {
        string[] parts = text.Split(':');
        return new Finding
        {
            Kind = parts[0],
            Indices = [.. parts[1].Split(',').Select(i => int.Parse(i, CultureInfo.InvariantCulture))],
            Group = parts.Length > 2 ? parts[2] : null,
            OnsetSeconds = _time - 5,
            Confidence = 0.999,
            Estimate = new Dictionary<string, object> { ["gainDecibels"] = GainDecibels },
        };
    }
}
