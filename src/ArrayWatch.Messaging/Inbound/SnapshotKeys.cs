namespace ArrayWatch.Messaging.Inbound;

/// <summary>Keys of a snapshot message.</summary>
[Flags]
internal enum SnapshotKeys
{
    /// <summary>A key that this service does not know.</summary>
    None = 0,
    Time = 1,
    Sequence = 2,
    Interval = 4,
    Overlap = 8,
    Frequencies = 16,
    Shape = 32,
    Data = 64,

    /// <summary>Keys that every message has.</summary>
    Required = Time | Sequence | Interval | Frequencies | Shape | Data,
}

/// <summary>The keys as they are written.</summary>
internal static class SnapshotKeyNames
{
    /// <summary>The key of a name; None when it is not known.</summary>
    public static SnapshotKeys Parse(ReadOnlySpan<byte> name) => name switch
    {
        _ when name.SequenceEqual("time"u8) => SnapshotKeys.Time,
        _ when name.SequenceEqual("sequence"u8) => SnapshotKeys.Sequence,
        _ when name.SequenceEqual("interval"u8) => SnapshotKeys.Interval,
        _ when name.SequenceEqual("overlap"u8) => SnapshotKeys.Overlap,
        _ when name.SequenceEqual("frequencies"u8) => SnapshotKeys.Frequencies,
        _ when name.SequenceEqual("shape"u8) => SnapshotKeys.Shape,
        _ when name.SequenceEqual("data"u8) => SnapshotKeys.Data,
        _ => SnapshotKeys.None,
    };

    /// <summary>The name of one key.</summary>
    public static string Name(SnapshotKeys key) => key switch
    {
        SnapshotKeys.Time => "time",
        SnapshotKeys.Sequence => "sequence",
        SnapshotKeys.Interval => "interval",
        SnapshotKeys.Overlap => "overlap",
        SnapshotKeys.Frequencies => "frequencies",
        SnapshotKeys.Shape => "shape",
        SnapshotKeys.Data => "data",
        _ => key.ToString(),
    };

    /// <summary>The names of several keys, quoted.</summary>
    public static string List(SnapshotKeys keys) =>
        string.Join(", ", Enum.GetValues<SnapshotKeys>()
            .Where(k => int.IsPow2((int)k) && (keys & k) != 0)
            .Select(static k => $"'{Name(k)}'"));
}
