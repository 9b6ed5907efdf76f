using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Trials;

/// <summary>Draws a whole trial from its name and its own start value.</summary>
internal static class TrialDraw
{
    public static TrialCase Draw(string name, ulong startValue, TrialOptions options)
    {
        RandomNumbers random = new RandomNumbers(startValue).Fork(17);
        Scene scene = Surroundings.Draw(random);
        double configured = scene.SoundSpeed;
        Fault? fault = null;
        if (FaultKinds.Has(name))
        {
            fault = FaultKinds.Of(name, scene, options.Size, options.WarmUpSeconds, random);
            scene = scene with { Faults = [fault] };
        }
        else
        {
            scene = Nuisances.Add(name, scene, random);
        }

        return new TrialCase
        {
            Name = name,
            StartValue = startValue,
            Scene = scene,
            Fault = fault,
            ConfiguredSoundSpeed = configured,
            Options = new DiagnosisOptions { TimeConstantSeconds = 60 },
            Description = Describe(scene, fault),
        };
    }

    /// <summary>A demonstration's scene, whose faults follow its own schedule.</summary>
    public static TrialCase Demonstration(DemoScene demo) => new()
    {
        Name = demo.Id,
        StartValue = 1,
        Scene = demo.Scene,
        Fault = null,
        ConfiguredSoundSpeed = demo.Scene.SoundSpeed,
        Options = new DiagnosisOptions { TimeConstantSeconds = demo.TimeConstant.TotalSeconds, FieldComponents = demo.FieldComponents },
        Description = demo.Title,
    };

    public static string Tell(Fault fault) => string.Create(CultureInfo.InvariantCulture, $"{fault.Kind} [{string.Join(", ", fault.Channels)}] ") + fault switch
    {
        DeadFault f => string.Create(CultureInfo.InvariantCulture, $"{f.RemainingDecibels:0.0} dB left"),
        GainFault f => string.Create(CultureInfo.InvariantCulture, $"{f.GainDecibels:0.0} dB"),
        RollOffFault f => string.Create(CultureInfo.InvariantCulture, $"corner {f.CornerHertz:0} Hz"),
        ExcessNoiseFault f => string.Create(CultureInfo.InvariantCulture, $"{f.ExcessDecibels:0.0} dB"),
        PhaseFault f => string.Create(CultureInfo.InvariantCulture, $"{f.PhaseDegrees:0.0}°"),
        DelayFault f => string.Create(CultureInfo.InvariantCulture, $"{f.DelayMicroseconds:0} µs"),
        ClockDriftFault f => string.Create(CultureInfo.InvariantCulture, $"{f.DriftPartsPerMillion:0.00} ppm"),
        SwapFault f => $"carries [{string.Join(", ", f.Carries)}]",
        CrosstalkFault f => string.Create(CultureInfo.InvariantCulture, $"from {f.From}, {f.LevelDecibels:0.0} dB, {f.PhaseDegrees:0}°"),
        CoherentInterferenceFault f => string.Create(CultureInfo.InvariantCulture, $"bins [{string.Join(", ", f.Bins)}], mean {f.ChannelDecibels.Average():0.0} dB"),
        IntermittentFault f => string.Create(CultureInfo.InvariantCulture, $"every {f.PeriodSeconds:0} s for {f.DutyCycle:0.0}"),
        _ => "",
    };

    private static string Describe(Scene scene, Fault? fault)
    {
        string waves = string.Join("; ", scene.Sources.OfType<PlaneWave>().Select(w => string.Create(
            CultureInfo.InvariantCulture, $"wave {w.Spectrum.LevelDecibels:0.0} dB at ({w.Toward.X:0.00}, {w.Toward.Y:0.00}, {w.Toward.Z:0.00})")));
        string text = string.Create(
            CultureInfo.InvariantCulture,
            $"{(Surroundings.IsLine(scene) ? "line" : "plane")} of {scene.Geometry.Count}, aperture {scene.Geometry.ApertureMetres:0.0} m, {scene.Frequencies.Count} bins {scene.Frequencies[0]:0}–{scene.Frequencies[^1]:0} Hz, {scene.SnapshotsPerFrame} × {scene.SnapshotIntervalSeconds:0.00} s, self-noise {scene.SelfNoise.LevelDecibels:0.0} dB, {waves}");
        return fault is null ? text : $"{text}; {Tell(fault)}";
    }
}
