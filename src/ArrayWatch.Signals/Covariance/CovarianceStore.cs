using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using ArrayWatch.Signals.Kernels;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Signals.Covariance;

/// <summary>
/// The sums of every bin, and room for vectors that have not been folded into them, in the layout of
/// <see cref="RankUpdate"/>: 4 bytes times about N² + 16N for the sums and 3·64·N for the vectors, a bin.
/// </summary>
/// <remarks>A single-writer accumulator. Memory is allocated once and stays where it is.</remarks>
internal sealed unsafe class CovarianceStore
{
    private const int Alignment = 64;

    private readonly KernelTier _tier;
    private readonly int _channels;
    private readonly int _panels;
    private readonly float[][] _sums;
    private readonly float[][] _packed;

    /// <summary>Allocates zero sums.</summary>
    public CovarianceStore(KernelTier tier, int channels, int bins)
    {
        _tier = tier;
        _channels = channels;
        _panels = RankUpdate.Panels(channels);
        long sum = RankUpdate.TileOffset(_panels, 0), packed = (long)_panels * RankUpdate.PackedPanelLength;
        if (sum > Array.MaxLength / 2) throw new ArgumentOutOfRangeException(nameof(channels), channels, "more channels than one bin's sums can hold");
        _sums = [.. Enumerable.Range(0, bins).Select(_ => Allocate((int)sum))];
        _packed = [.. Enumerable.Range(0, bins).Select(_ => Allocate((int)packed))];
    }

    /// <summary>Packs one snapshot of a bin.</summary>
    /// <param name="bin">The bin whose snapshot it is.</param>
    /// <param name="room">The bin whose room it goes to: its own, or another's when an update follows at once.</param>
    /// <param name="slot">0 to 63.</param>
    /// <param name="frame">2·F·N values: all bins of the snapshot.</param>
    /// <param name="amplitude">Square root of the weight, times the scale.</param>
    /// <param name="conjugate">Whether to conjugate.</param>
    public void Pack(int bin, int room, int slot, ReadOnlySpan<float> frame, float amplitude, bool conjugate)
    {
        fixed (float* x = frame.Slice(2 * bin * _channels, 2 * _channels))
            SnapshotPack.Append(_tier, x, _channels, amplitude, conjugate, Aligned(_packed[room]) + (slot * RankUpdate.PackedLength));
    }

    /// <summary>sum ← keep·sum + gain·Σ y yᴴ over the first <paramref name="depth"/> slots of a room.</summary>
    public void Update(int bin, int room, int depth, float keep, float gain) =>
        RankUpdate.Apply(_tier, Aligned(_sums[bin]), Aligned(_packed[room]), _panels, depth, keep, gain);

    /// <summary>Sets what is smaller in magnitude than <paramref name="threshold"/> to zero, before it becomes subnormal.</summary>
    public void Sweep(float threshold)
    {
        Vector<float> least = new(threshold);
        foreach (float[] sums in _sums)
        {
            float* s = Aligned(sums);
            nint length = RankUpdate.TileOffset(_panels, 0);
            for (nint i = 0; i < length; i += Vector<float>.Count)
            {
                Vector<float> v = Vector.Load(s + i);
                Vector.ConditionalSelect(Vector.LessThan(Vector.Abs(v), least), Vector<float>.Zero, v).Store(s + i);
            }
        }
    }

    /// <summary>Sets every sum to zero.</summary>
    public void Clear()
    {
        foreach (float[] sums in _sums) Array.Clear(sums);
    }

    /// <summary>Writes one bin's sums times a factor, both triangles, real on the diagonal.</summary>
    public void Copy(int bin, double factor, ComplexMatrix destination)
    {
        float* sums = Aligned(_sums[bin]);
        for (int p = 0; p < _panels; p++)
        {
            for (int q = 0; q <= p; q++) CopyTile(sums + RankUpdate.TileOffset(p, q), p, q, factor, destination);
        }
    }

    private void CopyTile(float* tile, int p, int q, double factor, ComplexMatrix destination)
    {
        int top = p * RankUpdate.PanelChannels, left = q * RankUpdate.PanelChannels;
        int high = Math.Min(RankUpdate.PanelChannels, _channels - top), wide = Math.Min(RankUpdate.PanelChannels, _channels - left);
        for (int c = 0; c < wide; c++)
        {
            // A column of the tile is, conjugated, a piece of a row above the diagonal.
            int first = p == q ? c : 0, mirror = ((left + c) * _channels) + top;
            float* re = tile + (c * RankUpdate.ColumnLength), im = re + RankUpdate.PanelChannels;
            for (int r = first; r < high; r++)
            {
                double x = factor * re[r], y = p == q && r == c ? 0 : factor * im[r];
                int direct = ((top + r) * _channels) + left + c;
                destination.Re[direct] = destination.Re[mirror + r] = x;
                destination.Im[mirror + r] = -y;
                destination.Im[direct] = y;
            }
        }
    }

    private static float[] Allocate(int length) => GC.AllocateArray<float>(length + (Alignment / sizeof(float)), pinned: true);

    /// <summary>The array is pinned for life; the first element at a multiple of 64 bytes is where its content starts.</summary>
    private static float* Aligned(float[] pinned)
    {
        float* start = (float*)Unsafe.AsPointer(ref MemoryMarshal.GetArrayDataReference(pinned));
        return (float*)(((nint)start + Alignment - 1) & ~(nint)(Alignment - 1));
    }
}
