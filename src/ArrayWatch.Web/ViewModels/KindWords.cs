namespace ArrayWatch.Web.ViewModels;

/// <summary>What each kind of alert is called on the pages, and what it means in plain words.</summary>
internal static class KindWords
{
    private static readonly Dictionary<string, KindWord> _words = new(StringComparer.Ordinal)
    {
        ["dead"] = new("Dead", "No acoustic signal reaches the channel; what it delivers is its own electronics."),
        ["gain"] = new("Gain", "Its amplitude is off what the field and its neighbours say, alike at all frequencies."),
        ["rolloff"] = new("Roll-off", "Its amplitude is off by an amount that depends on frequency."),
        ["excess-noise"] = new("Excess noise", "It carries incoherent noise above what the field explains."),
        ["polarity"] = new("Polarity", "Its sign is reversed: 180° at every frequency."),
        ["phase"] = new("Phase", "Its phase is off by an angle that does not grow with frequency."),
        ["delay"] = new("Delay", "It is early or late: its phase error grows with frequency."),
        ["clock-drift"] = new("Clock drift", "The time error of a group of channels grows with time."),
        ["swap"] = new("Swap", "Channels carry each other's data: they are connected in the wrong order."),
        ["crosstalk"] = new("Crosstalk", "One channel leaks into another."),
        ["coherent-interference"] = new("Coherent interference", "Channels share a component that no acoustic wave explains, such as electrical pick-up."),
        ["intermittent"] = new("Intermittent", "A fault comes and goes."),
        ["saturation"] = new("Saturation", "Samples reach full scale: the signal is clipped."),
        ["stuck"] = new("Stuck", "Samples keep one value."),
        ["offset"] = new("Offset", "Samples have a constant (DC) part."),
        ["stream"] = new("Data stream", "Frames are missing, late, repeated or refused, or nothing arrives."),
        ["geometry"] = new("Geometry", "The array is not where the configuration says: bowed, displaced or turned."),
    };

    /// <summary>Every kind of the public contract, in its order.</summary>
    public static IReadOnlyCollection<KeyValuePair<string, KindWord>> All => _words;

    /// <summary>Name and meaning of a kind; a kind that is not known is shown as it is.</summary>
    public static KindWord Of(string kind) => _words.TryGetValue(kind, out KindWord? word) ? word : new(kind, "");
}

/// <summary>A kind's name and meaning.</summary>
internal sealed record KindWord(string Name, string Meaning);
