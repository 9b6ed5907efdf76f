namespace ArrayWatch.Signals.Kernels;

/// <summary>The reference of <see cref="RankUpdate"/>: one element at a time, products unfused.</summary>
internal static unsafe class RankUpdateScalar
{
    /// <inheritdoc cref="RankUpdate.Apply"/>
    public static void Apply(float* sum, float* packed, int panels, int depth, float keep, float gain)
    {
        for (int p = 0; p < panels; p++)
        {
            for (int q = 0; q <= p; q++)
                Tile(sum + RankUpdate.TileOffset(p, q), packed + (p * RankUpdate.PackedPanelLength), packed + (q * RankUpdate.PackedPanelLength), depth, keep, gain);
        }
    }

    private static void Tile(float* s, float* rows, float* columns, int depth, float keep, float gain)
    {
        for (int c = 0; c < RankUpdate.PanelChannels; c++)
        {
            for (int r = 0; r < RankUpdate.PanelChannels; r++)
            {
                float re = 0, im = 0;
                for (int k = 0; k < depth; k++)
                {
                    float* a = rows + (k * RankUpdate.PackedLength) + r, b = columns + (k * RankUpdate.PackedLength) + c;
                    re += (a[0] * b[0]) + (a[16] * b[16]);
                    im += (a[16] * b[0]) - (a[0] * b[16]);
                }

                float* to = s + (c * RankUpdate.ColumnLength) + r;
                to[0] = (keep * to[0]) + (gain * re);
                to[16] = (keep * to[16]) + (gain * im);
            }
        }
    }
}
