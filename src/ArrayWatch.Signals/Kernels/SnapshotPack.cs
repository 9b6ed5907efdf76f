using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace ArrayWatch.Signals.Kernels;

/// <summary>Packs one snapshot of one bin into the panels of <see cref="RankUpdate"/>, times an amplitude.</summary>
/// <remarks>
/// In: <c>[channel][re, im]</c>, of any alignment. Out: one k of every panel, <c>[16 re | 16 im | 16 (re − im)]</c>.
/// Even lanes of two vectors make the real parts, odd lanes the imaginary parts. A last panel that is not full
/// is filled up with zeros first, so that every tier does whole panels. All tiers give the same bits.
/// </remarks>
internal static unsafe class SnapshotPack
{
    private const int PanelFloats = 2 * RankUpdate.PanelChannels;

    /// <summary>Packs.</summary>
    /// <param name="tier">A tier that runs here.</param>
    /// <param name="x">2·N values.</param>
    /// <param name="channels">N.</param>
    /// <param name="amplitude">Factor.</param>
    /// <param name="conjugate">Whether to conjugate.</param>
    /// <param name="packed">Where this k of the first panel goes; further panels follow at their distance.</param>
    [SkipLocalsInit]
    public static void Append(KernelTier tier, float* x, int channels, float amplitude, bool conjugate, float* packed)
    {
        int panels = channels / RankUpdate.PanelChannels, rest = channels % RankUpdate.PanelChannels;
        float imaginary = conjugate ? -amplitude : amplitude;
        Panels(tier, x, panels, amplitude, imaginary, packed);
        if (rest == 0) return;
        float* padded = stackalloc float[PanelFloats];
        new Span<float>(padded, PanelFloats).Clear();
        new ReadOnlySpan<float>(x + (panels * PanelFloats), 2 * rest).CopyTo(new Span<float>(padded, PanelFloats));
        Panels(tier, padded, 1, amplitude, imaginary, packed + ((nint)panels * RankUpdate.PackedPanelLength));
    }

    private static void Panels(KernelTier tier, float* x, int panels, float real, float imaginary, float* packed)
    {
        for (int p = 0; p < panels; p++)
        {
            if (tier == KernelTier.Avx512) Panel512(x, real, imaginary, packed);
            else if (tier == KernelTier.Avx2) Panel256(x, real, imaginary, packed);
            else PanelScalar(x, real, imaginary, packed);
            x += PanelFloats;
            packed += RankUpdate.PackedPanelLength;
        }
    }

    private static void Panel512(float* x, float real, float imaginary, float* packed)
    {
        Vector512<float> low = Vector512.Load(x), high = Vector512.Load(x + 16);
        Vector512<int> even = Vector512.Create(0, 2, 4, 6, 8, 10, 12, 14, 16, 18, 20, 22, 24, 26, 28, 30);
        Vector512<float> re = Avx512F.PermuteVar16x32x2(low, even, high) * real;
        Vector512<float> im = Avx512F.PermuteVar16x32x2(low, even + Vector512<int>.One, high) * imaginary;
        re.Store(packed);
        im.Store(packed + 16);
        (re - im).Store(packed + 32);
    }

    private static void Panel256(float* x, float real, float imaginary, float* packed)
    {
        for (int half = 0; half < 16; half += 8)
        {
            Vector256<float> low = Vector256.Load(x + (2 * half)), high = Vector256.Load(x + (2 * half) + 8);
            Vector256<float> re = InOrder(Avx.Shuffle(low, high, 0b10_00_10_00)) * real;
            Vector256<float> im = InOrder(Avx.Shuffle(low, high, 0b11_01_11_01)) * imaginary;
            re.Store(packed + half);
            im.Store(packed + half + 16);
            (re - im).Store(packed + half + 32);
        }
    }

    /// <summary>The shuffle works within 128 bits: its pairs stand low, high, low, high.</summary>
    private static Vector256<float> InOrder(Vector256<float> pairs) => Avx2.Permute4x64(pairs.AsDouble(), 0b11_01_10_00).AsSingle();

    private static void PanelScalar(float* x, float real, float imaginary, float* packed)
    {
        for (int i = 0; i < RankUpdate.PanelChannels; i++)
        {
            float re = x[2 * i] * real, im = x[(2 * i) + 1] * imaginary;
            packed[i] = re;
            packed[i + 16] = im;
            packed[i + 32] = re - im;
        }
    }
}
