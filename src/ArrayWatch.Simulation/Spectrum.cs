namespace ArrayWatch.Simulation;

/// <summary>Power against frequency: a level at one frequency and a constant slope.</summary>
/// <param name="LevelDecibels">Level at <paramref name="ReferenceHertz"/>, dB re 1 unit².</param>
/// <param name="SlopeDecibelsPerOctave">Change for each doubling of frequency, dB.</param>
/// <param name="ReferenceHertz">Where the level holds, hertz, positive.</param>
public readonly record struct Spectrum(double LevelDecibels, double SlopeDecibelsPerOctave = 0, double ReferenceHertz = 100)
{
    /// <summary>Power at <paramref name="frequencyHertz"/>, unit².</summary>
    public double PowerAt(double frequencyHertz) =>
        Decibels.ToPower(LevelDecibels + (SlopeDecibelsPerOctave == 0 ? 0 : SlopeDecibelsPerOctave * Math.Log2(frequencyHertz / ReferenceHertz)));
}
