namespace ArrayWatch.Monitoring.Streams;

/// <summary>What has come since the service started.</summary>
/// <param name="Frames">Frames folded in.</param>
/// <param name="Snapshots">Snapshots of those frames, less those left out.</param>
/// <param name="LastSequence">Sequence number of the last frame; null before the first.</param>
/// <param name="Refused">Messages refused, by reason.</param>
/// <param name="MissingFrames">Frames lost.</param>
/// <param name="Transients">Snapshots left out as transients.</param>
internal sealed record StreamTally(
    long Frames, long Snapshots, ulong? LastSequence, IReadOnlyList<long> Refused, long MissingFrames, long Transients);
