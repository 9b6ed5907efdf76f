using ArrayWatch.Signals.Kernels;

namespace ArrayWatch.Tests.Signals.Kernels;

/// <summary>Every tier that this process can run.</summary>
internal static class Tiers
{
    public static TheoryData<string> Available() => [.. Enum.GetValues<KernelTier>().Where(t => t <= KernelTiers.Best).Select(t => t.ToString())];

    public static KernelTier Parse(string name) => Enum.Parse<KernelTier>(name, ignoreCase: true);
}
