namespace ArrayWatch.Signals.Kernels;

/// <summary>The order in which <see cref="RankUpdate"/> goes over its tiles in 512-bit vectors.</summary>
/// <remarks>
/// Lanes are rows, a panel to a vector. From eight snapshots on, two panels of rows by four columns, three
/// multiplications to a complex product (<see cref="ThreeProductTiles"/>); for fewer, where the
/// traffic of S rules, one panel by eight columns, four multiplications (<see cref="FourProductTile"/>).
/// </remarks>
internal static unsafe class RankUpdate512
{
    private const int LeastDepth = 8;

    /// <inheritdoc cref="RankUpdate.Apply"/>
    public static void Apply(float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        if (depth < LeastDepth) Shallow(sum, packed, panels, depth, keep, gain);
        else Deep(sum, packed, panels, depth, keep, gain);
    }

    private static void Shallow(float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        for (int p = 0; p < panels; p++)
        {
            float* a = packed + (p * RankUpdate.PackedPanelLength);
            for (int q = 0; q <= p; q++)
            {
                float* s = sum + RankUpdate.TileOffset(p, q), b = packed + (q * RankUpdate.PackedPanelLength);
                FourProductTile.Add(s, a, b, depth, keep, gain);
                FourProductTile.Add(s + (8 * RankUpdate.ColumnLength), a, b + 8, depth, keep, gain);
            }
        }
    }

    private static void Deep(float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        for (int p = 0; p < panels; p += 2)
        {
            float* a = packed + (p * RankUpdate.PackedPanelLength), upper = sum + RankUpdate.TileOffset(p, 0), lower = sum + RankUpdate.TileOffset(p + 1, 0);
            bool pair = p + 1 < panels;
            for (int q = 0; q <= p; q++)
            {
                float* b = packed + (q * RankUpdate.PackedPanelLength);
                if (pair)
                {
                    for (int c = 0; c < RankUpdate.PanelChannels; c += 4)
                        ThreeProductTiles.AddPair(upper + (c * RankUpdate.ColumnLength), lower + (c * RankUpdate.ColumnLength), a, b + c, depth, keep, gain);
                }
                else
                {
                    ThreeProductTiles.AddSingle(upper, a, b, depth, keep, gain);
                    ThreeProductTiles.AddSingle(upper + (8 * RankUpdate.ColumnLength), a, b + 8, depth, keep, gain);
                }

                upper += RankUpdate.TileLength;
                lower += RankUpdate.TileLength;
            }

            if (!pair) continue;
            a += RankUpdate.PackedPanelLength;
            ThreeProductTiles.AddSingle(lower, a, a, depth, keep, gain);
            ThreeProductTiles.AddSingle(lower + (8 * RankUpdate.ColumnLength), a, a + 8, depth, keep, gain);
        }
    }
}
