using System.ComponentModel;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Http;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;
using Microsoft.AspNetCore.Routing;

namespace ArrayWatch.Web.Api;

/// <summary>What programs read about arrays.</summary>
internal static class ArrayEndpoints
{
    private const int DefaultPoints = 500, SmallestPoints = 2, LargestPoints = 10_000;

    public static void MapArrays(this IEndpointRouteBuilder app)
    {
        RouteGroupBuilder api = app.MapGroup("/api").AddEndpointFilter<ApiFailures>().WithTags("arrays");
        api.MapGet("/arrays", static (IFleet fleet) => TypedResults.Ok(fleet.Arrays.Select(ArraySummary.Of).ToArray()))
            .WithSummary("Each array: id, channels, bins, last frame, standing");
        api.MapGet("/arrays/{id}/health", Health)
            .WithSummary("The array's standing, as the retained health message").Produces<HealthReport>().ProducesProblem(StatusCodes.Status404NotFound);
        api.MapGet("/arrays/{id}/coherence", Coherence)
            .WithSummary("Coherence of every pair of channels at one bin, and the model's").Produces<CoherencePicture>()
            .ProducesProblem(StatusCodes.Status400BadRequest).ProducesProblem(StatusCodes.Status404NotFound);
        api.MapGet("/arrays/{id}/trends", TrendsAsync)
            .WithSummary("A downsampled series of one metric").Produces<TrendAnswer>()
            .ProducesProblem(StatusCodes.Status400BadRequest).ProducesProblem(StatusCodes.Status404NotFound);
        api.MapGet("/arrays/{id}/corrections", Corrections)
            .WithSummary("What a beamformer should apply now").Produces<CorrectionReport>().ProducesProblem(StatusCodes.Status404NotFound);
        api.MapGet("/{**rest}", static (string rest) => ApiProblem.Of(StatusCodes.Status404NotFound, "No such address",
            $"There is nothing at /api/{rest}; /openapi/v1.json lists what there is.")).ExcludeFromDescription();
    }

    private static ArrayOverview? Find(IFleet fleet, string id) => fleet.Arrays.FirstOrDefault(a => a.Id == id);

    private static ProblemHttpResult Unknown(IFleet fleet, string id) => ApiProblem.NoSuchArray(id, fleet.Arrays.Select(static a => a.Id));

    private static IResult Health(string id, IFleet fleet) =>
        Find(fleet, id) is null ? Unknown(fleet, id)
        : fleet.Health(id) is { } health ? TypedResults.Ok(health)
        : ApiProblem.NoDataYet(id, "health report");

    private static IResult Corrections(string id, IFleet fleet) =>
        Find(fleet, id) is null ? Unknown(fleet, id)
        : fleet.Corrections(id) is { } corrections ? TypedResults.Ok(corrections)
        : ApiProblem.NoDataYet(id, "corrections");

    private static IResult Coherence(
        string id,
        [FromQuery, Description("Hz; the nearest bin is answered")] string? frequency,
        [FromQuery, Description("\"fast\" (the default) or \"slow\" memory")] string? scale,
        IFleet fleet)
    {
        if (Find(fleet, id) is not { } array) return Unknown(fleet, id);
        string memory = string.IsNullOrEmpty(scale) ? "fast" : scale;
        if (memory is not ("fast" or "slow")) return ApiProblem.BadParameter("scale", $"scale is '{scale}'; 'fast' or 'slow' is allowed.");
        if (string.IsNullOrEmpty(frequency) || !QueryText.TryNumber(frequency, out double hertz) || hertz < 0)
        {
            string range = array.Frequencies.Count > 0
                ? FormattableString.Invariant($"this array's bins reach from {array.Frequencies[0]} to {array.Frequencies[^1]} Hz")
                : "this array has no data yet";
            return ApiProblem.BadParameter("frequency", $"frequency is '{frequency}'; give a number of hertz, not negative ({range}).");
        }
        return fleet.Coherence(id, hertz, memory) is { } picture ? TypedResults.Ok(picture) : ApiProblem.NoDataYet(id, "coherence");
    }

    private static async Task<IResult> TrendsAsync(
        string id,
        [FromQuery, Description("gainDecibels, phaseDegrees, delayMicroseconds, excessDecibels, levelDecibels of a channel; misfit, soundSpeed, … of the array")] string? metric,
        [FromQuery, Description("Label of the channel; needed for a channel's metric")] string? channel,
        [FromQuery, Description("Event time, RFC 3339, inclusive; a day before 'to' when left out")] string? from,
        [FromQuery, Description("Event time, RFC 3339, exclusive; just after the last frame when left out")] string? to,
        [FromQuery, Description("At most this many points, 2 to 10000; 500 when left out")] string? points,
        IFleet fleet, IHistory history, TimeProvider time, CancellationToken cancellation)
    {
        if (Find(fleet, id) is not { } array) return Unknown(fleet, id);
        string known = string.Join(", ", TrendMetric.Known.Select(static m => m.Key));
        if (string.IsNullOrEmpty(metric)) return ApiProblem.BadParameter("metric", $"metric is missing; give one of: {known}.");
        TrendMetric? found = TrendMetric.Find(metric);
        int? index = null;
        if (!string.IsNullOrEmpty(channel))
        {
            index = array.Geometry.Channels.ToList().FindIndex(c => c.Label == channel);
            if (index < 0) return ApiProblem.BadParameter("channel", $"array '{id}' has no channel '{channel}'; its labels are {array.Geometry.Channels[0].Label} to {array.Geometry.Channels[^1].Label}, listed at /api/arrays.");
        }
        if (found is { PerChannel: true } && index is null) return ApiProblem.BadParameter("channel", $"channel is missing; {metric} is a metric of each channel, so give a channel's label.");
        if (found is { PerChannel: false } && index is not null) return ApiProblem.BadParameter("channel", $"{metric} is a metric of the whole array; leave channel out.");

        DateTimeOffset end = (array.LastFrame ?? time.GetUtcNow()).AddSeconds(1);
        if (!string.IsNullOrEmpty(to) && !QueryText.TryTime(to, out end)) return BadTime("to", to);
        DateTimeOffset start = end > DateTimeOffset.MinValue.AddDays(2) ? end.AddDays(-1) : DateTimeOffset.MinValue;
        if (!string.IsNullOrEmpty(from) && !QueryText.TryTime(from, out start)) return BadTime("from", from);
        if (start >= end) return ApiProblem.BadParameter("from", $"from ({start:O}) is not before to ({end:O}).");
        int count = DefaultPoints;
        if (!string.IsNullOrEmpty(points) && (!QueryText.TryNumber(points, out double p) || p != Math.Floor(p) || p is < SmallestPoints or > LargestPoints || (count = (int)p) == 0))
            return ApiProblem.BadParameter("points", $"points is '{points}'; a whole number from {SmallestPoints} to {LargestPoints} is allowed.");

        TrendSeries series = await history.TrendAsync(id, metric, index, start, end, count, cancellation);
        return found is null && !series.Mean.Any(double.IsFinite)
            ? ApiProblem.BadParameter("metric", $"metric is '{metric}', of which nothing is kept; known ones are: {known}.")
            : TypedResults.Ok(new TrendAnswer(id, metric, index is null ? null : channel, start, end, series.Times, series.Mean, series.Minimum, series.Maximum));
    }

    internal static ProblemHttpResult BadTime(string name, string? text) => ApiProblem.BadParameter(
        name, $"{name} is '{text}'; give a time after RFC 3339 with its offset, such as 2026-05-01T04:12:30Z.");
}
