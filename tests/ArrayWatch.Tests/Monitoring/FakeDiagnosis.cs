using ArrayWatch.Detection;

namespace ArrayWatch.Tests.Monitoring;

/// <summary>Decisions with every channel alike.</summary>
internal static class FakeDiagnosis
{
    public static Diagnosis Of(double time, int channels, bool ready = true, Standing standing = Standing.Trusted) => new()
    {
        TimeSeconds = time,
        DegreesOfFreedom = 100,
        Ready = ready,
        Field = new FieldAssessment(0.01, 1500, true, new Dictionary<string, double>()),
        Channels = [.. Enumerable.Range(0, channels).Select(i => new ChannelAssessment(i, standing, null, null, null, null, null))],
        Findings = [],
        Corrections = [],
        Beams = [],
    };
}
