namespace ArrayWatch.Detection.Fitting;

/// <summary>A coherent component in one bin that no acoustic wave explains.</summary>
/// <param name="Frequency">Bin centre, hertz.</param>
/// <param name="Eigenvalue">Its eigenvalue in units of the model's noise.</param>
/// <param name="WaveShare">Share of the pattern that the best waves explain, 0 to 1, in the whitened metric.</param>
/// <param name="Power">Its power at each channel, unit².</param>
/// <param name="Relative">Its power at each channel over the power that the field explains there.</param>
internal sealed record ForeignPattern(double Frequency, double Eigenvalue, double WaveShare, double[] Power, double[] Relative);
