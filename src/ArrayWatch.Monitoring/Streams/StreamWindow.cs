using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Monitoring.Streams;

/// <summary>Counts of what came over the last ten minutes of event time, in sixty buckets. One caller at a time.</summary>
internal sealed class StreamWindow
{
    /// <summary>Length of the window, seconds.</summary>
    public const double Seconds = 600;

    private const int BucketCount = 60;
    private const double BucketSeconds = Seconds / BucketCount;

    private readonly Bucket[] _buckets;
    private long _number = long.MinValue;

    /// <summary>Starts empty.</summary>
    public StreamWindow(int channels)
    {
        _buckets = [.. Enumerable.Range(0, BucketCount).Select(_ => new Bucket(channels))];
    }

    /// <summary>Moves on to an event time; buckets that leave the window are emptied.</summary>
    public void MoveTo(double timeSeconds)
    {
        long number = (long)Math.Floor(timeSeconds / BucketSeconds);
        if (number <= _number) return;
        long first = _number == long.MinValue ? number - BucketCount + 1 : Math.Max(_number + 1, number - BucketCount + 1);
        for (long b = first; b <= number; b++) _buckets[((b % BucketCount) + BucketCount) % BucketCount].Clear();
        _number = number;
    }

    /// <summary>Empties the window, as when event time starts again.</summary>
    public void Clear()
    {
        foreach (Bucket b in _buckets) b.Clear();
        _number = long.MinValue;
    }

    public void CountFrame(int snapshots)
    {
        Now.Frames++;
        Now.Snapshots += snapshots;
    }

    public void CountGap(ulong missingFrames, bool late)
    {
        Now.Missing += (long)Math.Min(missingFrames, 1UL << 40);
        Now.LongestGap = Math.Max(Now.LongestGap, (long)Math.Min(missingFrames, 1UL << 40));
        if (late) Now.Late++;
    }

    public void CountRefusal(RefusalReason reason)
    {
        if (reason == RefusalReason.SequenceRepeated) Now.Repeated++;
        else Now.Refused++;
    }

    public void CountNotFinite(int channel, long snapshots) => Now.NotFinite[channel] += snapshots;

    public long Frames => _buckets.Sum(b => b.Frames);

    public long Snapshots => _buckets.Sum(b => b.Snapshots);

    public long Missing => _buckets.Sum(b => b.Missing);

    public long LongestGap => _buckets.Max(b => b.LongestGap);

    public long Late => _buckets.Sum(b => b.Late);

    public long Refused => _buckets.Sum(b => b.Refused);

    public long Repeated => _buckets.Sum(b => b.Repeated);

    public long NotFinite(int channel) => _buckets.Sum(b => b.NotFinite[channel]);

    private Bucket Now => _buckets[_number == long.MinValue ? 0 : _number % BucketCount];

    private sealed class Bucket(int channels)
    {
        public long Frames { get; set; }

        public long Snapshots { get; set; }

        public long Missing { get; set; }

        public long LongestGap { get; set; }

        public long Late { get; set; }

        public long Refused { get; set; }

        public long Repeated { get; set; }

        public long[] NotFinite { get; } = new long[channels];

        public void Clear()
        {
            Frames = Snapshots = Missing = LongestGap = Late = Refused = Repeated = 0;
            Array.Clear(NotFinite);
        }
    }
}
