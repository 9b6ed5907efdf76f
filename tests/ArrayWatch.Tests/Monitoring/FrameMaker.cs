using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;

namespace ArrayWatch.Tests.Monitoring;

/// <summary>Makes frames of independent Gaussian noise, in order unless told otherwise.</summary>
internal sealed class FrameMaker(int channels = 4, int bins = 3, int snapshots = 4, double interval = 0.25, int start = 1)
{
    public const double Begin = 1_780_000_000;

    private readonly Random _random = new(start);

    public double[] Frequencies { get; set; } = [.. Enumerable.Range(1, bins).Select(f => 100.0 * f)];

    public double Time { get; set; } = Begin;

    public ulong Sequence { get; set; }

    public double Interval { get; set; } = interval;

    public double Overlap { get; set; }

    public int Channels { get; set; } = channels;

    public double FrameSeconds => snapshots * Interval;

    /// <summary>Changes the data before they are sent: snapshot, channel → factor of amplitude.</summary>
    public Func<int, int, double> Factor { get; set; } = (_, _) => 1;

    public static ArrayDefinition Array(int channels = 4, double timeConstant = 12, string id = "aft") => new()
    {
        Id = id,
        Geometry = ArrayGeometry.UniformLine(channels, 0.75, new Position(1, 0, 0), "H", 1, groupSize: 2),
        Medium = new Medium.Given(1500),
        TimeConstant = TimeSpan.FromSeconds(timeConstant),
        SlowTimeConstant = TimeSpan.FromSeconds(10 * timeConstant),
    };

    public float[] Data()
    {
        float[] data = new float[2 * snapshots * Frequencies.Length * Channels];
        for (int i = 0; i < data.Length; i++)
        {
            int at = i / 2, channel = at % Channels, snapshot = at / (Channels * Frequencies.Length);
            double g = Math.Sqrt(-2 * Math.Log(1 - _random.NextDouble())) * Math.Cos(2 * Math.PI * _random.NextDouble());
            data[i] = (float)(g * Factor(snapshot, channel));
        }

        return data;
    }

    public SnapshotFrame Frame(float[] data) => new()
    {
        TimeSeconds = Time,
        Sequence = Sequence,
        IntervalSeconds = Interval,
        Overlap = Overlap,
        Frequencies = Frequencies,
        Snapshots = snapshots,
        Channels = Channels,
        Data = data,
    };

    /// <summary>Sends the next frame.</summary>
    public Refusal? Send(IArrayInbox inbox) => Send(inbox, Data());

    /// <summary>Sends the next frame with given data.</summary>
    public Refusal? Send(IArrayInbox inbox, float[] data)
    {
        Refusal? refusal = inbox.Accept(Frame(data));
        Step();
        return refusal;
    }

    /// <summary>Moves on by one frame without sending it.</summary>
    public void Step()
    {
        Sequence++;
        Time += FrameSeconds;
    }
}
