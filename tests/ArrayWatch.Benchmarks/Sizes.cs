namespace ArrayWatch.Benchmarks;

/// <summary>What is measured: everything, or a selection that takes a few minutes.</summary>
internal static class Sizes
{
    public static bool Quick { get; set; }

    public static IEnumerable<int> Channels => Quick ? [64, 256] : [32, 64, 128, 256, 512];

    public static IEnumerable<int> Snapshots => Quick ? [1, 32] : [1, 8, 32, 64];

    public static IEnumerable<int> Matrices => Quick ? [32, 128] : [16, 24, 32, 64, 128, 256, 512];

    public static IEnumerable<int> DecisionChannels => Quick ? [32] : [32, 128, 512];
}
