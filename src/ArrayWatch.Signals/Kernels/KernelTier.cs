using System.Numerics;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>The instruction sets that the single-precision kernels are written for, slowest first.</summary>
internal enum KernelTier
{
    /// <summary>The reference: one element at a time.</summary>
    Scalar,

    /// <summary>Vectors of whatever width the machine has.</summary>
    Portable,

    /// <summary>256-bit vectors, fused.</summary>
    Avx2,

    /// <summary>512-bit vectors, fused.</summary>
    Avx512,
}

/// <summary>What this machine offers.</summary>
internal static class KernelTiers
{
    /// <summary>The fastest tier that runs here. Constant once compiled: no field, so no class to initialise in a loop.</summary>
    public static KernelTier Best =>
        Avx512F.IsSupported ? KernelTier.Avx512
        : Avx2.IsSupported && Fma.IsSupported ? KernelTier.Avx2
        : Vector.IsHardwareAccelerated ? KernelTier.Portable
        : KernelTier.Scalar;
}
