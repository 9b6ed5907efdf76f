namespace ArrayWatch.Detection;

/// <summary>What a beamformer should apply to one channel.</summary>
/// <param name="Index">0-based index in the array.</param>
/// <param name="Use">False: leave the channel out.</param>
/// <param name="Carries">The index whose data it really carries; its own when it is not exchanged.</param>
/// <param name="GainReal">Per bin, real part of the factor to multiply its data by.</param>
/// <param name="GainImaginary">Per bin, imaginary part of that factor.</param>
/// <param name="StandardError">Per bin, standard error of the factor (of its modulus, relative; the same in radians of its phase).</param>
public sealed record ChannelCorrection(
    int Index, bool Use, int Carries, double[] GainReal, double[] GainImaginary, double[] StandardError);
