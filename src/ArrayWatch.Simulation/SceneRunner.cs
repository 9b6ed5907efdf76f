using ArrayWatch.Signals;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Simulation;

/// <summary>
/// Plays a scene frame by frame. Sound → healthy response and acoustic faults → self-noise → electrical
/// faults. The same scene and start value give the same frames. One caller at a time.
/// </summary>
public sealed class SceneRunner
{
    private readonly Scene _scene;
    private readonly RandomNumbers _random;
    private readonly RandomNumbers _streamRandom;
    private readonly DiffuseField _diffuse;
    private readonly ArrayPlaces _places;
    private readonly WaveSource[] _waves;
    private readonly StreamFault[] _streamFaults;
    private readonly Fault[] _channelFaults;
    private readonly double[] _fieldPower;
    private readonly double[] _selfNoise;
    private readonly double[] _responseRe;
    private readonly double[] _responseIm;
    private readonly double[] _re;
    private readonly double[] _im;
    private readonly float[] _last;
    private ulong _nextFrame;
    private bool _repeat;

    /// <summary>Prepares a scene.</summary>
    /// <param name="scene">What to play.</param>
    /// <param name="random">Its start value, not its state, fixes the frames.</param>
    /// <exception cref="ArgumentException">The scene cannot be run; the message says why.</exception>
    public SceneRunner(Scene scene, RandomNumbers random)
    {
        ArgumentNullException.ThrowIfNull(scene);
        ArgumentNullException.ThrowIfNull(random);
        scene.Validate();
        _scene = scene;
        _random = random.Fork(1);
        _streamRandom = random.Fork(2);
        _places = new ArrayPlaces(scene);
        _diffuse = new DiffuseField(scene);
        _waves = [.. scene.Sources.OfType<WaveSource>()];
        _streamFaults = [.. scene.Faults.OfType<StreamFault>()];
        _channelFaults = [.. scene.Faults.Where(f => f is not StreamFault and not DisplacementFault)];
        int n = scene.Geometry.Count, bins = scene.Frequencies.Count;
        _fieldPower = [.. scene.Frequencies.Select(scene.FieldPowerAt)];
        _selfNoise = new double[bins * n];
        _responseRe = new double[n];
        _responseIm = new double[n];
        for (int i = 0; i < n; i++)
        {
            ChannelResponse r = scene.Responses.Count == 0 ? default : scene.Responses[i];
            double gain = Decibels.ToAmplitude(r.GainDecibels), phase = r.PhaseDegrees * Math.PI / 180;
            _responseRe[i] = gain * Math.Cos(phase);
            _responseIm[i] = gain * Math.Sin(phase);
            for (int f = 0; f < bins; f++)
                _selfNoise[(f * n) + i] = Math.Sqrt(scene.SelfNoise.PowerAt(scene.Frequencies[f]) * Decibels.ToPower(r.SelfNoiseDecibels));
        }

        _re = new double[n];
        _im = new double[n];
        FrameLength = 2 * scene.SnapshotsPerFrame * bins * n;
        _last = new float[_streamFaults.Length > 0 ? FrameLength : 0];
    }

    /// <summary>Number of values in a frame, 2·K·F·N.</summary>
    public int FrameLength { get; }

    /// <summary>Sequence number of the last frame given.</summary>
    public ulong Sequence { get; private set; }

    /// <summary>Event time of the first snapshot of the last frame given, seconds since 1970.</summary>
    public double TimeSeconds { get; private set; }

    /// <summary>How much later than its last snapshot the last frame given would arrive, seconds.</summary>
    public double LatenessSeconds { get; private set; }

    /// <summary>Event time of the last snapshot of the last frame given, seconds since 1970.</summary>
    public double LastSnapshotSeconds => TimeSeconds + ((_scene.SnapshotsPerFrame - 1) * _scene.SnapshotIntervalSeconds);

    /// <summary>
    /// Gives the next frame that arrives. Frames that a stream fault loses are passed over (the sequence
    /// jumps); one that it repeats comes again with the same sequence and data.
    /// </summary>
    /// <param name="data">2·K·F·N values: row-major over snapshot, bin, channel, real then imaginary.</param>
    /// <exception cref="ArgumentException">The span does not hold exactly a frame.</exception>
    public void NextFrame(Span<float> data)
    {
        if (data.Length != FrameLength) throw new ArgumentException($"a frame of this scene has {FrameLength} values, not {data.Length}", nameof(data));
        if (_repeat)
        {
            _repeat = false;
            _last.CopyTo(data);
            return;
        }

        bool lost;
        do
        {
            double begin = _nextFrame * _scene.FrameSeconds;
            Sequence = _nextFrame++;
            TimeSeconds = _scene.StartTimeSeconds + begin;
            Play(begin, data);
            lost = Afflict(begin);
        }
        while (lost);
        if (_repeat) data.CopyTo(_last);
    }

    private bool Afflict(double begin)
    {
        bool lost = false;
        LatenessSeconds = 0;
        foreach (StreamFault fault in _streamFaults)
        {
            if (!fault.IsActive(begin)) continue;
            lost |= fault.MissingShare > 0 && _streamRandom.NextDouble() < fault.MissingShare;
            _repeat |= fault.RepeatedShare > 0 && _streamRandom.NextDouble() < fault.RepeatedShare;
            LatenessSeconds = Math.Max(LatenessSeconds, fault.LatenessSeconds);
        }

        _repeat &= !lost;
        return lost;
    }

    private void Play(double begin, Span<float> data)
    {
        int n = _scene.Geometry.Count, at = 0;
        for (int k = 0; k < _scene.SnapshotsPerFrame; k++)
        {
            double time = begin + (k * _scene.SnapshotIntervalSeconds);
            if (_places.Update(time)) _diffuse.Rebuild(_places.Positions, time);
            for (int f = 0; f < _scene.Frequencies.Count; f++)
            {
                Sound(time, f);
                Signal(time, f);
                for (int i = 0; i < n; i++)
                {
                    data[at++] = (float)_re[i];
                    data[at++] = (float)_im[i];
                }
            }
        }
    }

    private void Sound(double time, int bin)
    {
        Array.Clear(_re);
        Array.Clear(_im);
        _diffuse.AddDraw(time, bin, _random, _re, _im);
        SoundMoment moment = new()
        {
            Positions = _places.Positions,
            SoundSpeed = _scene.SoundSpeed,
            SceneSeconds = time,
            FrequencyHertz = _scene.Frequencies[bin],
        };
        foreach (WaveSource wave in _waves) wave.AddWave(moment, _random.NextComplexGaussian(), _re, _im);
    }

    private void Signal(double time, int bin)
    {
        FaultMoment moment = new()
        {
            SceneSeconds = time,
            Bin = bin,
            FrequencyHertz = _scene.Frequencies[bin],
            FieldPower = _fieldPower[bin],
            Random = _random,
        };
        foreach (Fault fault in _channelFaults)
        {
            if (fault.IsActive(time)) fault.OnSound(moment, _re, _im);
        }

        ReadOnlySpan<double> noise = _selfNoise.AsSpan(bin * _re.Length, _re.Length);
        for (int i = 0; i < _re.Length; i++)
        {
            (double zr, double zi) = _random.NextComplexGaussian();
            double re = (_re[i] * _responseRe[i]) - (_im[i] * _responseIm[i]), im = (_re[i] * _responseIm[i]) + (_im[i] * _responseRe[i]);
            _re[i] = re + (noise[i] * zr);
            _im[i] = im + (noise[i] * zi);
        }

        foreach (Fault fault in _channelFaults)
        {
            if (fault.IsActive(time)) fault.OnSignal(moment, _re, _im);
        }
    }
}
