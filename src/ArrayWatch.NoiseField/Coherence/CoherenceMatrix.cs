using System.Numerics;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>Coherence matrices of homogeneous fields: fields whose coherence depends on the separation alone.</summary>
public static class CoherenceMatrix
{
    /// <summary>Writes Γ[l, m] = coherence(p_l − p_m), Hermitian, with a unit diagonal.</summary>
    /// <param name="geometry">Where the N channels are.</param>
    /// <param name="coherence">Γ of a separation in metres; asked once a pair, Γ(−d) = Γ(d)* being implied.</param>
    /// <param name="destination">N×N; both triangles are written.</param>
    /// <exception cref="ArgumentException">The destination is not N×N.</exception>
    public static void Fill(ArrayGeometry geometry, Func<Position, Complex> coherence, ComplexMatrix destination)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        ArgumentNullException.ThrowIfNull(coherence);
        ArgumentNullException.ThrowIfNull(destination);
        int n = geometry.Count;
        if (destination.Rows != n || destination.Columns != n)
            throw new ArgumentException($"{destination.Rows}×{destination.Columns} does not hold {n} channels", nameof(destination));
        for (int l = 0; l < n; l++)
        {
            destination[l, l] = 1;
            for (int m = 0; m < l; m++)
            {
                Complex value = coherence(geometry[l] - geometry[m]);
                destination[l, m] = value;
                destination[m, l] = Complex.Conjugate(value);
            }
        }
    }
}
