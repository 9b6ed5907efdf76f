namespace ArrayWatch.Simulation.Faults;

/// <summary>Frames that go missing, come twice or come late.</summary>
public sealed record StreamFault : Fault
{
    /// <summary>Share of the frames that never arrive, 0 to 1, below 1.</summary>
    public double MissingShare { get; init; }

    /// <summary>Share of the frames that arrive a second time, 0 to 1, below 1.</summary>
    public double RepeatedShare { get; init; }

    /// <summary>How much later than its last snapshot a frame arrives, seconds.</summary>
    public double LatenessSeconds { get; init; }

    /// <inheritdoc/>
    public override string Kind => "stream";
}
