using System.Numerics;

namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// Second moments of untrusted channels' data with the predictions at untrusted channels' places, for one bin.
/// </summary>
/// <param name="channels">The untrusted channels, ascending; U of them.</param>
internal sealed class PlaceTable(int[] channels)
{
    /// <summary>The untrusted channels.</summary>
    public int[] Channels { get; } = channels;

    /// <summary>Effective snapshots, ν, of the data.</summary>
    public double Snapshots { get; set; }

    /// <summary>E[x_n y_m*]: data of channel n (row), prediction at the place of channel m (column).</summary>
    public Complex[,] Cross { get; } = new Complex[channels.Length, channels.Length];

    /// <summary>E|y_m|².</summary>
    public double[] Predicted { get; } = new double[channels.Length];

    /// <summary>E|x_n|².</summary>
    public double[] Level { get; } = new double[channels.Length];

    /// <summary>Power at place m that the others cannot predict, healthy self-noise included.</summary>
    public double[] Unpredicted { get; } = new double[channels.Length];

    /// <summary>
    /// Power that remains of channel <paramref name="n"/>'s data when they are taken for <paramref name="gain"/> times the prediction at the
    /// place of <paramref name="m"/>, no less than the model can vouch for.
    /// </summary>
    /// <param name="n">Row.</param>
    /// <param name="m">Column.</param>
    /// <param name="gain">Response.</param>
    /// <param name="caution">Relative error that even a healthy response may have.</param>
    public double Residual(int n, int m, Complex gain, double caution)
    {
        double magnitude = (gain.Real * gain.Real) + (gain.Imaginary * gain.Imaginary);
        double r = Level[n] - (2 * (Complex.Conjugate(gain) * Cross[n, m]).Real) + (magnitude * Predicted[m]);
        return Math.Max(r, 1e-6 * Level[n]) + (caution * caution * magnitude * Predicted[m]) + double.Epsilon;
    }
}
