using System.Runtime.InteropServices;

namespace ArrayWatch.Storage;

/// <summary>Mean, minimum, maximum and number of known values per channel over an interval.</summary>
internal sealed class Summary(int channels)
{
    private readonly double[] _sum = new double[channels];
    private readonly float[] _count = new float[channels], _minimum = new float[channels], _maximum = new float[channels];

    public int Channels => channels;

    public double Samples => _count.Sum(x => (double)x);

    public double Mean(int i) => _count[i] > 0 ? _sum[i] / _count[i] : double.NaN;

    public double Minimum(int i) => _count[i] > 0 ? _minimum[i] : double.NaN;

    public double Maximum(int i) => _count[i] > 0 ? _maximum[i] : double.NaN;

    public void Add(int i, double sum, float count, float minimum, float maximum)
    {
        if (!(count > 0)) return;
        _minimum[i] = _count[i] > 0 ? Math.Min(_minimum[i], minimum) : minimum;
        _maximum[i] = _count[i] > 0 ? Math.Max(_maximum[i], maximum) : maximum;
        _sum[i] += sum;
        _count[i] += count;
    }

    public void Add(Summary other, int from, int to) =>
        Add(to, other._sum[from], other._count[from], other._minimum[from], other._maximum[from]);

    /// <summary>Little-endian float32: mean, minimum, maximum, count, one run of channels after the other.</summary>
    public byte[] Write()
    {
        float[] all = [.. Enumerable.Range(0, channels).Select(i => (float)Mean(i)), .. _minimum, .. _maximum, .. _count];
        return MemoryMarshal.AsBytes<float>(all).ToArray();
    }

    /// <summary>Raw rows hold the values alone.</summary>
    public static Summary Read(byte[] data, bool raw)
    {
        ReadOnlySpan<float> v = MemoryMarshal.Cast<byte, float>(data);
        int n = raw ? v.Length : v.Length / 4;
        Summary s = new(n);
        for (int i = 0; i < n; i++)
        {
            if (!raw) s.Add(i, v[i] * (double)v[(3 * n) + i], v[(3 * n) + i], v[n + i], v[(2 * n) + i]);
            else if (float.IsFinite(v[i])) s.Add(i, v[i], 1, v[i], v[i]);
        }

        return s;
    }
}
