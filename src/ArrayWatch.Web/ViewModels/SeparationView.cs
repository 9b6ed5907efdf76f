using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>Coherence magnitude against separation: each pair as measured, and the model's mean over bands of separation.</summary>
/// <param name="Pairs">Pairs of channels, those of marked channels apart.</param>
/// <param name="Marked">Pairs with a channel that is suspect or faulty.</param>
/// <param name="Model">The model; empty before the first fit.</param>
internal sealed record SeparationView(IReadOnlyList<PairPoint> Pairs, IReadOnlyList<PairPoint> Marked, IReadOnlyList<PairPoint> Model)
{
    /// <summary>Most points that are sent.</summary>
    public const int Largest = 4000;

    private const int ModelBands = 60;

    /// <summary>Makes the view of one coherence picture.</summary>
    /// <param name="picture">The picture.</param>
    /// <param name="labels">Labels, for the points' text.</param>
    /// <param name="isMarked">True for channels whose pairs stand out.</param>
    public static SeparationView Of(CoherencePicture picture, IReadOnlyList<string> labels, Func<int, bool> isMarked)
    {
        ArgumentNullException.ThrowIfNull(picture);
        int n = picture.Channels;
        bool hasModel = picture.ModelMagnitude.Length == n * n;
        int pairs = n * (n - 1) / 2;

        // A stride that shares no factor with the row length spreads what is left over all separations.
        int stride = Math.Max(1, (pairs + Largest - 1) / Largest);
        if (stride > 1) stride |= 1;
        List<PairPoint> plain = [], marked = [];
        float longest = 0;
        for (int i = 0; i < n * n; i++) longest = Math.Max(longest, picture.SeparationMetres[i]);
        double[] sums = new double[ModelBands], places = new double[ModelBands];
        int[] counts = new int[ModelBands];
        int pair = 0;
        for (int row = 1; row < n; row++)
        {
            for (int column = 0; column < row; column++, pair++)
            {
                int at = (row * n) + column;
                double separation = picture.SeparationMetres[at];
                if (hasModel && longest > 0)
                {
                    int band = Math.Min(ModelBands - 1, (int)(separation / longest * ModelBands));
                    sums[band] += picture.ModelMagnitude[at];
                    places[band] += separation;
                    counts[band]++;
                }
                if (pair % stride != 0 || !float.IsFinite(picture.Magnitude[at])) continue;
                (isMarked(row) || isMarked(column) ? marked : plain).Add(new(separation, picture.Magnitude[at], $"{labels[column]} – {labels[row]}"));
            }
        }
        return new(plain, marked, [.. Enumerable.Range(0, ModelBands).Where(b => counts[b] > 0).Select(b => new PairPoint(places[b] / counts[b], sums[b] / counts[b], ""))]);
    }
}

/// <summary>One pair of channels.</summary>
/// <param name="SeparationMetres">Distance between them, metres.</param>
/// <param name="Magnitude">Coherence magnitude, 0 to 1.</param>
/// <param name="Text">Both labels.</param>
internal sealed record PairPoint(double SeparationMetres, double Magnitude, string Text);
