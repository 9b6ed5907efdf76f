using ArrayWatch.Monitoring.Ports;
using ArrayWatch.NoiseField.Media;

namespace ArrayWatch.Monitoring.Estimation;

/// <summary>The sound speed in use: the configured medium's, until a reading says better. One caller at a time.</summary>
/// <remarks>
/// A reading's own sound speed wins; otherwise it is computed from the reading's temperature, salinity and depth, with
/// the configured or last read value for what the reading leaves out. A medium given as a speed alone has no
/// temperature to fall back to, so a reading must then bring all of them (sea water). A reading that is older than the
/// last, or gives a speed that no sound has, changes nothing.
/// </remarks>
internal sealed class SoundSpeedTracker
{
    /// <summary>Below any gas that a microphone would be used in, m/s.</summary>
    internal const double Slowest = 100;

    /// <summary>Above any liquid or solid, m/s.</summary>
    internal const double Fastest = 15_000;

    private readonly Medium _medium;
    private double? _temperature;
    private double? _salinity;
    private double? _depth;
    private DateTimeOffset? _time;

    /// <summary>Starts from the configuration.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The configured medium is outside the equations' range.</exception>
    public SoundSpeedTracker(Medium medium)
    {
        _medium = medium;
        switch (medium)
        {
            case Medium.SeaWater s:
                (_temperature, _salinity, _depth) = (s.Temperature, s.Salinity, s.Depth);
                break;
            case Medium.Air a:
                _temperature = a.Temperature;
                break;
        }

        MetresPerSecond = Compute() ?? ((Medium.Given)medium).SoundSpeed;
    }

    /// <summary>Sound speed in use, m/s.</summary>
    public double MetresPerSecond { get; private set; }

    /// <summary>Takes a reading.</summary>
    /// <returns>Why it was left aside; null when it was taken or says nothing of the speed.</returns>
    public string? Take(EnvironmentReading reading)
    {
        if (reading.Time is { } time)
        {
            if (time < _time) return "it is older than the last reading";
            _time = time;
        }

        if (reading.SoundSpeed is { } given) return Use(given);
        if (reading.Temperature is null && reading.Salinity is null && reading.Depth is null) return null;
        (double? temperature, double? salinity, double? depth) = (_temperature, _salinity, _depth);
        _temperature = reading.Temperature ?? _temperature;
        _salinity = reading.Salinity ?? _salinity;
        _depth = reading.Depth ?? _depth;
        try
        {
            return Compute() is { } computed ? Use(computed) : null;
        }
        catch (ArgumentOutOfRangeException e)
        {
            (_temperature, _salinity, _depth) = (temperature, salinity, depth);
            return e.Message;
        }
    }

    private string? Use(double speed)
    {
        if (!(speed is >= Slowest and <= Fastest)) return $"a sound speed of {speed} m/s; {Slowest} to {Fastest} is allowed";
        MetresPerSecond = speed;
        return null;
    }

    private double? Compute() => (_medium, _temperature, _salinity, _depth) switch
    {
        (Medium.Air air, { } t, _, _) => SoundSpeed.Air(t, air.Humidity, air.Pressure),
        (_, { } t, { } s, { } d) => SoundSpeed.SeaWater(t, s, d),
        _ => null,
    };
}
