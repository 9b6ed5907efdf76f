using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>
/// Powers of one bin's atoms: R = Σ_q s_q v_q v_qᴴ + Σ_d t_d C_d + diag(σ²) + Σ_i a_i a_iᴴ, all powers ≥ 0, the a_i being patterns
/// that no wave makes (interference), given from outside. Mutable; one writer.
/// </summary>
public sealed class FieldPowers
{
    /// <summary>Creates powers of zero.</summary>
    public FieldPowers(FieldBasis basis)
    {
        ArgumentNullException.ThrowIfNull(basis);
        Basis = basis;
        Waves = new double[basis.Directions.Length];
        Dense = new double[basis.Dense.Length];
        ChannelNoise = new double[basis.Channels];
    }

    /// <summary>The atoms.</summary>
    public FieldBasis Basis { get; }

    /// <summary>s, one a plane wave.</summary>
    public double[] Waves { get; }

    /// <summary>t, one a dense atom.</summary>
    public double[] Dense { get; }

    /// <summary>σ², one a channel.</summary>
    public double[] ChannelNoise { get; }

    /// <summary>Power of the waves and the dense atoms at any sensor.</summary>
    public double FieldPower => Waves.Sum() + Dense.Sum();

    /// <summary>Directions of the waves that hold power, strongest first.</summary>
    /// <param name="share">Least share of the field's power.</param>
    /// <param name="most">At most this many.</param>
    public IReadOnlyList<Position> ActiveDirections(double share, int most)
    {
        double least = share * FieldPower;
        return [.. Enumerable.Range(0, Waves.Length).Where(q => Waves[q] > least && Waves[q] > 0)
            .OrderByDescending(q => Waves[q]).Take(most).Select(q => Basis.Directions[q])];
    }

    /// <summary>Writes the field's covariance, without the channels' own noise.</summary>
    /// <param name="destination">N×N; both triangles are written.</param>
    public void WriteField(ComplexMatrix destination)
    {
        ArgumentNullException.ThrowIfNull(destination);
        int n = Basis.Channels;
        destination.Clear();
        for (int d = 0; d < Dense.Length; d++)
        {
            if (Dense[d] <= 0) continue;
            ComplexMatrix c = Basis.Dense[d].Coherence;
            for (int i = 0; i < c.Re.Length; i++)
            {
                destination.Re[i] += Dense[d] * c.Re[i];
                destination.Im[i] += Dense[d] * c.Im[i];
            }
        }

        int[] active = [.. Enumerable.Range(0, Waves.Length).Where(q => Waves[q] > 0)];
        if (active.Length == 0) return;
        ComplexMatrix rows = new(active.Length, n), sum = new(n, n);
        for (int a = 0; a < active.Length; a++)
        {
            double root = Math.Sqrt(Waves[active[a]]);
            for (int i = 0; i < n; i++)
            {
                // Conjugated, so that rowsᴴ rows is Σ s v vᴴ transposed twice: (rowsᴴ rows)[l, m] = Σ v_l v_m*.
                rows.Re[(a * n) + i] = root * Basis.Waves.Re[(active[a] * n) + i];
                rows.Im[(a * n) + i] = -root * Basis.Waves.Im[(active[a] * n) + i];
            }
        }

        Products.ConjugateTransposeMultiply(rows, rows, sum);
        for (int i = 0; i < sum.Re.Length; i++)
        {
            destination.Re[i] += sum.Re[i];
            destination.Im[i] += sum.Im[i];
        }
    }
}
