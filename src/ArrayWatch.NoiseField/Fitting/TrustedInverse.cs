using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>Inverts a model covariance over the trusted channels only.</summary>
public static class TrustedInverse
{
    /// <summary>
    /// Fills W = (R_TT)⁻¹ scattered into N×N with zero rows and columns elsewhere, then W S′ and W S′ W.
    /// </summary>
    /// <param name="work">Its field and data are read; its weight and products are written.</param>
    /// <param name="channelNoise">σ², added to the field's diagonal.</param>
    /// <param name="trusted">Which channels count; at least one.</param>
    /// <returns>False when the model is not positive definite.</returns>
    public static bool TryUpdate(FitWorkspace work, ReadOnlySpan<double> channelNoise, ReadOnlySpan<bool> trusted)
    {
        ArgumentNullException.ThrowIfNull(work);
        int n = work.Channels, size = 0;
        Span<int> index = n <= 512 ? stackalloc int[n] : new int[n];
        for (int i = 0; i < n; i++)
        {
            if (trusted[i]) index[size++] = i;
        }

        if (size == 0) return false;
        ComplexMatrix model = new(size, size), inverse = new(size, size);
        for (int a = 0; a < size; a++)
        {
            for (int b = 0; b <= a; b++)
            {
                model.Re[(a * size) + b] = work.Field.Re[(index[a] * n) + index[b]];
                model.Im[(a * size) + b] = work.Field.Im[(index[a] * n) + index[b]];
            }

            model.Re[(a * size) + a] += channelNoise[index[a]];
        }

        if (!Hermitian.TryInvert(model, inverse, out double logDeterminant)) return false;
        work.LogDeterminant = logDeterminant;
        work.Weight.Clear();
        for (int a = 0; a < size; a++)
        {
            for (int b = 0; b < size; b++)
            {
                work.Weight.Re[(index[a] * n) + index[b]] = inverse.Re[(a * size) + b];
                work.Weight.Im[(index[a] * n) + index[b]] = inverse.Im[(a * size) + b];
            }
        }

        Products.Multiply(work.Weight, work.Data, work.WeightData);
        Products.Multiply(work.WeightData, work.Weight, work.WeightDataWeight);
        return true;
    }
}
