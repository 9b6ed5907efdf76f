namespace ArrayWatch.Detection;

/// <summary>What may be done with a channel's data.</summary>
public enum Standing
{
    /// <summary>The data cannot tell: too few of them, or a field that shows nothing of this channel.</summary>
    Unknown,

    /// <summary>Within tolerance.</summary>
    Trusted,

    /// <summary>Beyond tolerance, but not yet with the confidence that an alert needs.</summary>
    Suspect,

    /// <summary>A fault is confirmed.</summary>
    Faulty,

    /// <summary>Taken out of use by a person.</summary>
    OutOfService,
}
