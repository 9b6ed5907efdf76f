namespace ArrayWatch.Web.Api;

/// <summary>A downsampled series; null where there is nothing.</summary>
/// <param name="Array">Id of the array.</param>
/// <param name="Metric">Name of the metric.</param>
/// <param name="Channel">Label of the channel; null for a metric of the whole array.</param>
/// <param name="From">Start, inclusive.</param>
/// <param name="To">End, exclusive.</param>
/// <param name="Times">Time of each point.</param>
/// <param name="Mean">Mean of each point's interval.</param>
/// <param name="Minimum">Smallest value of each point's interval.</param>
/// <param name="Maximum">Largest value of each point's interval.</param>
public sealed record TrendAnswer(
    string Array, string Metric, string? Channel, DateTimeOffset From, DateTimeOffset To,
    DateTimeOffset[] Times, double[] Mean, double[] Minimum, double[] Maximum);
