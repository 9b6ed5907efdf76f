namespace ArrayWatch.Signals.Kernels;

/// <summary>
/// Rank-K update of one Hermitian matrix in single precision, one triangle: S ← keep·S + gain·Σ_k y_k y_kᴴ.
/// </summary>
/// <remarks>
/// <para>Layout. Channels stand in panels of 16. S is its block lower triangle in tiles of 16×16, row of panels
/// after row of panels: tile (p, q), q ≤ p, is number p(p+1)/2 + q. A tile is <c>[column][16 re | 16 im]</c>, so
/// that the lanes are the rows: S[16p + r, 16q + c] has its real part at c·32 + r, its imaginary part 16
/// further. A diagonal tile is formed whole but only its lower half is meant; the imaginary part of its
/// diagonal is rounding noise.</para>
/// <para>The vectors y_k of a matrix, weights folded in, are <c>[panel][k][16 re | 16 im | 16 (re − im)]</c>; the third
/// stream serves the tier that trades a multiplication for additions. The same copy is row and column
/// operand. Channels beyond the last are zero. S and the packed vectors start at multiples of 64 bytes.</para>
/// <para>Every tier sums over k in ascending order from zero and then touches S once. |error| of an element (l, m)
/// is at most a small multiple of 2⁻²⁴ K √(S_ll S_mm); that bound, not bitwise equality, is what tiers share.
/// A static field with an initialiser, read in a kernel, would leave a call in its loop, across which every
/// accumulator is spilt: the kernels have none.</para>
/// </remarks>
internal static unsafe class RankUpdate
{
    /// <summary>Channels of a panel.</summary>
    public const int PanelChannels = 16;

    /// <summary>Floats from one column of a tile to the next.</summary>
    public const int ColumnLength = 2 * PanelChannels;

    /// <summary>Floats of a tile.</summary>
    public const int TileLength = PanelChannels * ColumnLength;

    /// <summary>Floats from one k to the next in a packed panel.</summary>
    public const int PackedLength = 3 * PanelChannels;

    /// <summary>Most vectors that one update takes: their panels stay in the first-level cache.</summary>
    public const int MaximumDepth = 64;

    /// <summary>Floats of a packed panel, of whatever depth.</summary>
    public const int PackedPanelLength = MaximumDepth * PackedLength;

    /// <summary>Number of panels of N channels.</summary>
    public static int Panels(int channels) => (channels + PanelChannels - 1) / PanelChannels;

    /// <summary>Where tile (p, q) starts, in floats.</summary>
    public static nint TileOffset(int p, int q) => ((((nint)p * (p + 1)) / 2) + q) * TileLength;

    /// <summary>Updates S.</summary>
    /// <param name="tier">A tier that runs here.</param>
    /// <param name="sum">S.</param>
    /// <param name="packed">The vectors, panels at a distance of <see cref="PackedPanelLength"/>.</param>
    /// <param name="panels">Number of panels, at least 1.</param>
    /// <param name="depth">K, 0 to 64.</param>
    /// <param name="keep">Factor of what stands in S.</param>
    /// <param name="gain">Factor of what comes in.</param>
    public static void Apply(KernelTier tier, float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        switch (tier)
        {
            case KernelTier.Avx512:
                RankUpdate512.Apply(sum, packed, panels, depth, keep, gain);
                break;
            case KernelTier.Avx2:
                RankUpdate256.Apply(sum, packed, panels, depth, keep, gain);
                break;
            case KernelTier.Portable:
                RankUpdateVector.Apply(sum, packed, panels, depth, keep, gain);
                break;
            default:
                RankUpdateScalar.Apply(sum, packed, panels, depth, keep, gain);
                break;
        }
    }
}
