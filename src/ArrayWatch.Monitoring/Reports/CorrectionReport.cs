namespace ArrayWatch.Monitoring.Reports;

/// <summary>What a beamformer should apply now: the retained corrections message.</summary>
public sealed record CorrectionReport
{
    /// <summary>Event time.</summary>
    public required DateTimeOffset Time { get; init; }

    /// <summary>Id of the array.</summary>
    public required string Array { get; init; }

    /// <summary>Bin centres, Hz.</summary>
    public required IReadOnlyList<double> Frequencies { get; init; }

    /// <summary>One a channel, index 0 first.</summary>
    public required IReadOnlyList<ChannelCorrectionReport> Channels { get; init; }

    /// <summary>One a look direction and beamformer.</summary>
    public required IReadOnlyList<BeamReport> Beams { get; init; }
}

/// <summary>One channel's correction.</summary>
/// <param name="Index">0-based index.</param>
/// <param name="Label">What people call it.</param>
/// <param name="Use">False: leave it out.</param>
/// <param name="Carries">The index whose data it really carries.</param>
/// <param name="Gain">Per bin [re, im]: multiply the channel's data by this.</param>
/// <param name="StandardError">Per bin.</param>
public sealed record ChannelCorrectionReport(
    int Index, string Label, bool Use, int Carries, IReadOnlyList<double[]> Gain, IReadOnlyList<double> StandardError);

/// <summary>Array gain of one beamformer in one look direction, dB.</summary>
/// <param name="Name">Name of the look direction.</param>
/// <param name="Azimuth">Degrees.</param>
/// <param name="Elevation">Degrees.</param>
/// <param name="Beamformer">"conventional" or "adaptive".</param>
/// <param name="HealthyDecibels">With every channel right.</param>
/// <param name="FoundDecibels">As found.</param>
/// <param name="CorrectedDecibels">After these corrections.</param>
public sealed record BeamReport(
    string Name, double Azimuth, double Elevation, string Beamformer,
    double HealthyDecibels, double FoundDecibels, double CorrectedDecibels);
