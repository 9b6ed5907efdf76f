using System.Runtime.InteropServices;
using ArrayWatch.Signals;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>
/// What a snapshot message has said so far, in whichever order its keys came. Made once and reused; its buffers
/// grow to the largest message seen and are then kept. For one thread at a time.
/// </summary>
internal sealed class SnapshotFields(int maxMessageBytes)
{
    private const double LatestTime = 253_402_300_799;

    // A bin has at least one complex float32 value, so that no valid message has more bins.
    private readonly int _mostFrequencies = Math.Max(1, maxMessageBytes / 8);
    private double[] _frequencies = new double[64];
    private float[] _values = [];
    private ReadOnlyMemory<byte> _inPlace;
    private SnapshotKeys _seen;
    private long _snapshots, _bins, _channels;

    public double TimeSeconds { get; set; }

    public ulong Sequence { get; set; }

    public double IntervalSeconds { get; set; }

    public double Overlap { get; set; }

    /// <summary>Bin centres given so far.</summary>
    public int FrequencyCount { get; private set; }

    /// <summary>Values given so far.</summary>
    public int ValueCount { get; private set; }

    /// <summary>Forgets the last message; keeps the buffers.</summary>
    public void Clear()
    {
        _seen = SnapshotKeys.None;
        _inPlace = default;
        Overlap = 0;
        FrequencyCount = 0;
        ValueCount = 0;
    }

    /// <summary>Notes that a key is there.</summary>
    /// <exception cref="MessageRefusedException">It was there before.</exception>
    public void Meet(SnapshotKeys key)
    {
        if ((_seen & key) != 0) MessageRefusedException.NotDecodable($"The key '{SnapshotKeyNames.Name(key)}' is given twice; give it once.");
        _seen |= key;
    }

    public void SetShape(ReadOnlySpan<long> shape) => (_snapshots, _bins, _channels) = (shape[0], shape[1], shape[2]);

    public void AddFrequency(double hertz)
    {
        CheckFrequencyCount(FrequencyCount + 1);
        if (FrequencyCount == _frequencies.Length) Array.Resize(ref _frequencies, 2 * _frequencies.Length);
        _frequencies[FrequencyCount++] = hertz;
    }

    /// <summary>Room for all bin centres at once.</summary>
    public Span<double> TakeFrequencies(int count)
    {
        CheckFrequencyCount(count);
        if (_frequencies.Length < count) _frequencies = new double[count];
        FrequencyCount = count;
        return _frequencies.AsSpan(0, count);
    }

    public void AddValue(float value)
    {
        if (ValueCount == _values.Length) Array.Resize(ref _values, Math.Max(1024, 2 * _values.Length));
        _values[ValueCount++] = value;
    }

    /// <summary>Room for all values at once.</summary>
    public Span<float> TakeValues(int count)
    {
        if (_values.Length < count) _values = GC.AllocateUninitializedArray<float>(count);
        ValueCount = count;
        return _values.AsSpan(0, count);
    }

    /// <summary>Values that are read where they lie in the message.</summary>
    public void UseInPlace(ReadOnlyMemory<byte> singles)
    {
        _inPlace = singles;
        ValueCount = singles.Length / sizeof(float);
    }

    /// <summary>Checks the whole and views it as a frame, which is valid until the next <see cref="Clear"/>.</summary>
    /// <exception cref="MessageRefusedException">Something is missing, out of range or does not fit.</exception>
    public SnapshotFrame ToFrame()
    {
        CheckPresent();
        CheckTiming();
        CheckShape();
        CheckFrequencies();
        return new SnapshotFrame
        {
            TimeSeconds = TimeSeconds,
            Sequence = Sequence,
            IntervalSeconds = IntervalSeconds,
            Overlap = Overlap,
            Frequencies = _frequencies.AsSpan(0, FrequencyCount),
            Snapshots = (int)_snapshots,
            Channels = (int)_channels,
            Data = _inPlace.IsEmpty ? _values.AsSpan(0, ValueCount) : MemoryMarshal.Cast<byte, float>(_inPlace.Span),
        };
    }

    private void CheckFrequencyCount(int count)
    {
        if (count > _mostFrequencies)
            MessageRefusedException.WrongShape($"'frequencies' has {count} bin centres or more, over the {_mostFrequencies} that a message of {maxMessageBytes} bytes can serve; send fewer bins.");
    }

    private void CheckPresent()
    {
        SnapshotKeys missing = SnapshotKeys.Required & ~_seen;
        if (missing != 0)
            MessageRefusedException.NotDecodable($"The snapshot message lacks {SnapshotKeyNames.List(missing)}; add what is missing.");
    }

    private void CheckTiming()
    {
        if (!(TimeSeconds is >= 0 and <= LatestTime))
            MessageRefusedException.NotDecodable($"'time' is {TimeSeconds:R} s since 1970; it must lie between 1970 and 9999.");
        if (!(IntervalSeconds > 0) || !double.IsFinite(IntervalSeconds))
            MessageRefusedException.NotDecodable($"'interval' is {IntervalSeconds:R}; it must be a positive number of seconds.");
        if (!(Overlap is >= 0 and < 1))
            MessageRefusedException.NotDecodable($"'overlap' is {Overlap:R}; it must be at least 0 and below 1.");
    }

    private void CheckShape()
    {
        if (_snapshots < 1 || _bins < 1 || _channels < 1 || _snapshots > int.MaxValue || _bins > int.MaxValue || _channels > int.MaxValue)
            MessageRefusedException.WrongShape($"'shape' is {Shape}; each of snapshots, bins and channels must be at least 1.");
        // No message of the allowed size can hold that many values, so that the products below stay within 63 bits.
        long cells = _snapshots * _bins;
        if (cells > maxMessageBytes || cells * _channels > maxMessageBytes)
            MessageRefusedException.WrongShape($"'shape' is {Shape}, more values than a message of {maxMessageBytes} bytes can hold; send fewer snapshots a message.");
        long values = 2 * cells * _channels;
        if (ValueCount != values)
            MessageRefusedException.WrongShape($"'data' has {ValueCount} values, but 'shape' {Shape} needs {values} (real and imaginary parts); make them agree.");
        if (FrequencyCount != _bins)
            MessageRefusedException.WrongShape($"'frequencies' has {FrequencyCount} bin centres, but 'shape' {Shape} says {_bins} bins; make them agree.");
    }

    private void CheckFrequencies()
    {
        double below = -double.Epsilon;
        for (int i = 0; i < FrequencyCount; i++)
        {
            double f = _frequencies[i];
            if (!(f > below) || !double.IsFinite(f))
                MessageRefusedException.NotDecodable($"'frequencies'[{i}] is {f:R} Hz; bin centres must be finite, not negative and ascending.");
            below = f;
        }
    }

    private string Shape => $"[{_snapshots}, {_bins}, {_channels}]";
}
