namespace ArrayWatch.Detection.Beams;

/// <summary>
/// What a channel really delivers at each bin: y = g x_carries + e, x being what the sensors receive and e noise of the channel's own
/// that the model of the healthy array does not have.
/// </summary>
/// <param name="Carries">Index of the sensor whose data it carries; its own when it is not exchanged.</param>
/// <param name="GainReal">Per bin, real part of g; 1 when healthy, 0 when dead.</param>
/// <param name="GainImaginary">Per bin, imaginary part of g.</param>
/// <param name="Noise">Per bin, power of e in the units of the model's covariance, not negative.</param>
public sealed record ChannelResponse(int Carries, double[] GainReal, double[] GainImaginary, double[] Noise)
{
    /// <summary>A channel that delivers what its sensor receives.</summary>
    /// <param name="index">Its 0-based index.</param>
    /// <param name="bins">Number of bins.</param>
    public static ChannelResponse Healthy(int index, int bins)
        => new(index, [.. Enumerable.Repeat(1.0, bins)], new double[bins], new double[bins]);

    /// <summary>A channel that delivers nothing but noise of its own.</summary>
    /// <param name="index">Its 0-based index.</param>
    /// <param name="noise">Per bin, its power; zeros for a channel that is silent.</param>
    public static ChannelResponse Dead(int index, double[] noise)
    {
        ArgumentNullException.ThrowIfNull(noise);
        return new(index, new double[noise.Length], new double[noise.Length], noise);
    }
}
