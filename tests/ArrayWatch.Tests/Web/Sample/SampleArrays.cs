using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;

namespace ArrayWatch.Tests.Web.Sample;

/// <summary>Arrays of each shape and standing.</summary>
internal static class SampleArrays
{
    public static SampleArray FaultyLine(DateTimeOffset now)
    {
        ArrayGeometry line = ArrayGeometry.UniformLine(32, 0.75, new Position(1, 0, 0), "H", 1, 8);
        return new SampleArray("aft", line)
        {
            Standing = "degraded",
            Standings = new Dictionary<int, Standing> { [11] = Standing.Faulty, [17] = Standing.Faulty, [23] = Standing.Suspect, [3] = Standing.Unknown, [30] = Standing.OutOfService },
            Gains = new Dictionary<int, double> { [23] = -3.4 },
            Carries = new Dictionary<int, int> { [11] = 17, [17] = 11 },
            Alerts = [Swap(now), DeadReturned(now)],
        };
    }

    public static SampleArray HealthyPlane()
    {
        Random random = new(20);
        return new SampleArray("meadow", new ArrayGeometry(Enumerable.Range(0, 16).Select(i => new Channel(
            $"M{i + 1:00}", new Position(4 * random.NextDouble(), 3.6 * random.NextDouble(), 0.1 * random.NextDouble()), $"B{(i / 4) + 1}"))))
        { SoundSpeed = 340.5 };
    }

    public static SampleArray SilentVolume() => new("dome", new ArrayGeometry(
        from z in Enumerable.Range(0, 3) from y in Enumerable.Range(0, 4) from x in Enumerable.Range(0, 4)
        select new Channel($"D{(z * 16) + (y * 4) + x + 1}", new Position(x + (0.2 * z), y + (0.3 * z), 0.8 * z))))
    { Standing = "silent", Age = TimeSpan.FromMinutes(14) };

    public static SampleArray LargePlane() => new("field", new ArrayGeometry(
        from y in Enumerable.Range(0, 16) from x in Enumerable.Range(0, 16) select new Channel($"F{(y * 16) + x + 1}", new Position(x * 2, y * 2, 0))));

    public static SampleArray Waiting() => new("spare", ArrayGeometry.UniformLine(8, 1, new Position(0, 1, 0), "S")) { Standing = "waiting" };

    public static AlertEvent Swap(DateTimeOffset now) => new()
    {
        Id = "01JSWAP0000000000000000001",
        Array = "aft",
        Kind = "swap",
        State = AlertState.Unacknowledged,
        Priority = AlertPriority.High,
        Channels = ["H12", "H18"],
        Indices = [11, 17],
        Onset = now.AddMinutes(-31),
        Raised = now.AddMinutes(-29),
        Changed = now.AddMinutes(-29),
        Estimate = new Dictionary<string, object> { ["mapping"] = new Dictionary<int, int> { [11] = 17, [17] = 11 } },
        Confidence = 0.9997,
        Effect = new Dictionary<string, double> { ["conventional"] = 2.7, ["adaptive"] = 7.5 },
        Advice = "Use H12's data as H18 and H18's as H12, or exchange their connectors.",
        Evidence = new Dictionary<string, double> { ["log-likelihood gained by exchange"] = 412.6, ["pairs that fit better"] = 58, ["bins"] = 12 },
    };

    public static AlertEvent Phase(DateTimeOffset now) => new()
    {
        Id = "01JPHASE000000000000000003",
        Array = "meadow",
        Kind = "phase",
        State = AlertState.Unacknowledged,
        Priority = AlertPriority.Medium,
        Channels = ["M07"],
        Indices = [6],
        Group = null,
        Onset = now.AddSeconds(-95),
        Raised = now.AddSeconds(-5),
        Changed = now.AddSeconds(-5),
        Estimate = new Dictionary<string, object> { ["phaseDegrees"] = 47.3, ["standardErrorDegrees"] = 0.8 },
        Confidence = 0.998,
        Effect = new Dictionary<string, double> { ["conventional"] = 0.4, ["adaptive"] = 1.9 },
        Advice = "Multiply M07 by the published factor, or leave it out.",
        Alternatives = ["delay"],
        Reason = "The bins span too little of the band to tell a constant phase from a time error.",
        Evidence = new Dictionary<string, double> { ["phase against the model, °"] = 47.3, ["tolerance, °"] = 15 },
    };

    private static AlertEvent DeadReturned(DateTimeOffset now) => new()
    {
        Id = "01JDEAD0000000000000000002",
        Array = "aft",
        Kind = "dead",
        State = AlertState.ReturnedUnacknowledged,
        Priority = AlertPriority.Medium,
        Channels = ["H7"],
        Indices = [6],
        Onset = now.AddHours(-7),
        Raised = now.AddHours(-6.9),
        Returned = now.AddHours(-5),
        Changed = now.AddHours(-5),
        Estimate = new Dictionary<string, object> { ["levelDecibels"] = -48.2 },
        Confidence = 0.99996,
        Effect = new Dictionary<string, double> { ["conventional"] = 0.3, ["adaptive"] = 0.6 },
        Advice = "Nothing now; look at the connector of H7 when convenient.",
        Cause = "loose connector",
        Evidence = new Dictionary<string, double> { ["multiple coherence with the rest"] = 0.004, ["level against neighbours, dB"] = -17.1 },
    };
}
