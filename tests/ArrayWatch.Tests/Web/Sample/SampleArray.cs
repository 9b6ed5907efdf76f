using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;
using ChannelStanding = ArrayWatch.Detection.Standing;

namespace ArrayWatch.Tests.Web.Sample;

/// <summary>One invented array: what is not said to be wrong with it is right.</summary>
internal sealed record SampleArray(string Id, ArrayGeometry Geometry)
{
    public double SoundSpeed { get; init; } = 1500;

    public string Standing { get; init; } = "healthy";

    public TimeSpan Age { get; init; } = TimeSpan.FromSeconds(2);

    public IReadOnlyDictionary<int, ChannelStanding> Standings { get; init; } = new Dictionary<int, ChannelStanding>();

    public IReadOnlyDictionary<int, double> Gains { get; init; } = new Dictionary<int, double>();

    public IReadOnlyDictionary<int, int> Carries { get; init; } = new Dictionary<int, int>();

    public IReadOnlyList<AlertEvent> Alerts { get; init; } = [];

    public IReadOnlyList<double> Frequencies { get; init; } = [.. Enumerable.Range(0, 12).Select(i => 200.0 + (60 * i))];

    public ArrayOverview Overview(DateTimeOffset now, int openAlerts) => new()
    {
        Id = Id,
        Geometry = Geometry,
        Frequencies = Frequencies,
        LastFrame = Standing == "waiting" ? null : now - Age,
        LastArrival = Standing == "waiting" ? null : now - Age,
        Standing = Standing,
        Counts = Enumerable.Range(0, Geometry.Count).GroupBy(Of).ToDictionary(static g => g.Key, static g => g.Count()),
        OpenAlerts = openAlerts,
        SoundSpeed = SoundSpeed,
        TimeConstant = TimeSpan.FromSeconds(60),
        SlowTimeConstant = TimeSpan.FromSeconds(1800),
    };

    public HealthReport? Health(DateTimeOffset now, IReadOnlyList<AlertEvent> open) => Standing == "waiting" ? null : new()
    {
        Time = now - Age,
        Array = Id,
        Frames = 5121,
        Snapshots = 40968,
        LastSequence = 5120,
        Refused = new Dictionary<string, long>(),
        Field = new FieldReport(0.021, SoundSpeed, true, new Dictionary<string, double> { ["isotropic"] = 0.42, ["plane-waves"] = 0.55, ["channel-noise"] = 0.03 }),
        Alerts = [.. open.Where(a => a.Array == Id).Select(static a => a.Id)],
        Channels = [.. Enumerable.Range(0, Geometry.Count).Select(Channel)],
        Ready = true,
        DegreesOfFreedom = 1920,
    };

    public CorrectionReport Corrections(DateTimeOffset now) => new()
    {
        Time = now - Age,
        Array = Id,
        Frequencies = Frequencies,
        Channels =
        [
            .. Enumerable.Range(0, Geometry.Count).Select(i => new ChannelCorrectionReport(
                i, Geometry.Channels[i].Label, !double.IsNegativeInfinity(Gains.GetValueOrDefault(i)), Carries.GetValueOrDefault(i, i),
                [.. Frequencies.Select(_ => new[] { Math.Pow(10, -Gains.GetValueOrDefault(i) / 20), 0 })],
                [.. Frequencies.Select(static _ => 0.01)])),
        ],
        Beams =
        [
            new BeamReport("ahead", 0, 0, "conventional", 15.1, Standings.Count > 0 ? 12.4 : 15.0, 15.0),
            new BeamReport("ahead", 0, 0, "adaptive", 18.7, Standings.Count > 0 ? 11.2 : 18.7, 18.6),
            new BeamReport("abeam", 90, 0, "conventional", 14.2, Standings.Count > 0 ? 13.9 : 14.2, 14.2),
            new BeamReport("abeam", 90, 0, "adaptive", 16.0, Standings.Count > 0 ? 13.1 : 16.0, 15.9),
        ],
    };

    /// <summary>Spherical isotropic noise (coherence sin kd / kd, Cook et al. 1955) and half as much from one plane wave along x.</summary>
    public CoherencePicture? Coherence(double frequency, string scale, DateTimeOffset now)
    {
        if (Standing == "waiting") return null;
        double bin = Frequencies.MinBy(f => Math.Abs(f - frequency));
        int n = Geometry.Count;
        float[] magnitude = new float[n * n], phase = new float[n * n], modelMagnitude = new float[n * n], modelPhase = new float[n * n], separation = new float[n * n];
        for (int l = 0; l < n; l++)
        {
            for (int m = 0; m < n; m++)
            {
                int at = (l * n) + m;
                (double Magnitude, double Phase) model = Expected(bin, l, m), found = Expected(bin, Carries.GetValueOrDefault(l, l), Carries.GetValueOrDefault(m, m));
                double scatter = l == m ? 0 : 0.02 * Math.Sin((l * 12.9898) + (m * 78.233));
                separation[at] = (float)Geometry[l].DistanceTo(Geometry[m]);
                (modelMagnitude[at], modelPhase[at]) = ((float)model.Magnitude, (float)model.Phase);
                (magnitude[at], phase[at]) = ((float)Math.Clamp(found.Magnitude + scatter, 0, 1), (float)found.Phase);
            }
        }
        return new CoherencePicture
        {
            Time = now - Age, Frequency = bin, Scale = scale, Channels = n, Magnitude = magnitude, PhaseDegrees = phase,
            ModelMagnitude = modelMagnitude, ModelPhaseDegrees = modelPhase, SeparationMetres = separation,
        };
    }

    private (double Magnitude, double Phase) Expected(double frequency, int l, int m)
    {
        double k = 2 * Math.PI * frequency / SoundSpeed, d = Geometry[l].DistanceTo(Geometry[m]);
        double isotropic = d > 0 ? Math.Sin(k * d) / (k * d) : 1;
        double wave = k * (Geometry[l].X - Geometry[m].X);
        double re = (isotropic + (0.5 * Math.Cos(wave))) / 1.5, im = 0.5 * Math.Sin(wave) / 1.5;
        return (Math.Sqrt((re * re) + (im * im)), Math.Atan2(im, re) * 180 / Math.PI);
    }

    private ChannelStanding Of(int index) => Standings.GetValueOrDefault(index, ChannelStanding.Trusted);

    private ChannelReport Channel(int i)
    {
        bool blind = Of(i) is ChannelStanding.Unknown or ChannelStanding.OutOfService;
        double small = Math.Sin(i * 2.7);
        return new ChannelReport
        {
            Index = i,
            Label = Geometry.Channels[i].Label,
            Standing = Of(i),
            LevelDecibels = -31.2 + (0.4 * small) + Gains.GetValueOrDefault(i),
            LevelDecibelsStandardError = 0.12,
            GainDecibels = blind ? null : (0.2 * small) + Gains.GetValueOrDefault(i),
            GainDecibelsStandardError = blind ? null : 0.11,
            PhaseDegrees = blind ? null : 0.9 * Math.Cos(i * 1.9),
            PhaseDegreesStandardError = blind ? null : 0.6,
            DelayMicroseconds = blind ? null : 2.1 * small,
            DelayMicrosecondsStandardError = blind ? null : 3.2,
            ExcessDecibels = blind ? null : 0.3 * Math.Cos(i * 3.1),
            ExcessDecibelsStandardError = blind ? null : 0.4,
        };
    }
}
