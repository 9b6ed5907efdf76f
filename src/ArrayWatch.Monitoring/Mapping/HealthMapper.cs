using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;
using ArrayWatch.Signals;

namespace ArrayWatch.Monitoring.Mapping;

/// <summary>A decision, in the words of the health message. Pure.</summary>
internal static class HealthMapper
{
    /// <summary>Maps one decision.</summary>
    public static HealthReport Map(
        ArrayDefinition array, Diagnosis diagnosis, StreamTally stream, IReadOnlySet<int> outOfService, IReadOnlyList<AlertEvent> openAlerts) => new()
    {
        Time = EventTime.FromSeconds(diagnosis.TimeSeconds),
        Array = array.Id,
        Frames = stream.Frames,
        Snapshots = stream.Snapshots,
        LastSequence = stream.LastSequence,
        Refused = Enumerable.Range(0, stream.Refused.Count).ToDictionary(i => RefusalReasons.Name((RefusalReason)i), i => stream.Refused[i]),
        Field = new FieldReport(diagnosis.Field.Misfit, diagnosis.Field.SoundSpeed, diagnosis.Field.Understood, diagnosis.Field.Shares),
        Alerts = [.. openAlerts.Where(Stands).Select(a => a.Id)],
        Channels = [.. diagnosis.Channels.Select(c => Map(array, c, outOfService.Contains(c.Index)))],
        Ready = diagnosis.Ready,
        DegreesOfFreedom = diagnosis.DegreesOfFreedom,
    };

    /// <summary>Whether an alert stands and people are told of it.</summary>
    public static bool Stands(AlertEvent alert) => alert.State is AlertState.Unacknowledged or AlertState.Acknowledged;

    private static ChannelReport Map(ArrayDefinition array, ChannelAssessment c, bool outOfService) => new()
    {
        Index = c.Index,
        Label = array.Geometry.Channels[c.Index].Label,
        Standing = outOfService ? Standing.OutOfService : c.Standing,
        LevelDecibels = Value(c.LevelDecibels),
        LevelDecibelsStandardError = Error(c.LevelDecibels),
        GainDecibels = Value(c.GainDecibels),
        GainDecibelsStandardError = Error(c.GainDecibels),
        PhaseDegrees = Value(c.PhaseDegrees),
        PhaseDegreesStandardError = Error(c.PhaseDegrees),
        DelayMicroseconds = Value(c.DelayMicroseconds),
        DelayMicrosecondsStandardError = Error(c.DelayMicroseconds),
        ExcessDecibels = Value(c.ExcessDecibels),
        ExcessDecibelsStandardError = Error(c.ExcessDecibels),
    };

    private static double? Value(Measured? m) => m is { } x && double.IsFinite(x.Value) ? x.Value : null;

    private static double? Error(Measured? m) => m is { } x && double.IsFinite(x.StandardError) ? x.StandardError : null;
}
