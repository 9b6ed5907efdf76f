using System.ComponentModel;
using System.Globalization;
using System.Text.Json;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Http;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.AspNetCore.Routing;
using Microsoft.OpenApi;

namespace ArrayWatch.Web.Api;

/// <summary>What programs read about alerts and do to them.</summary>
internal static class AlertEndpoints
{
    private const int DefaultLimit = 1000, LargestLimit = 10_000, LongestWho = 100, LongestWhy = 1000;
    private static readonly TimeSpan _longestShelf = TimeSpan.FromDays(7);

    public static void MapAlerts(this IEndpointRouteBuilder app)
    {
        RouteGroupBuilder api = app.MapGroup("/api").AddEndpointFilter<ApiFailures>().WithTags("alerts");
        api.MapGet("/alerts", ListAsync)
            .WithSummary("Alerts as of their last change, newest first").Produces<AlertEvent[]>().ProducesProblem(StatusCodes.Status400BadRequest).ProducesProblem(StatusCodes.Status404NotFound);
        api.MapGet("/alerts/{id}", OneAsync)
            .WithSummary("One alert with its changes and its audit log").Produces<AlertDetail>().ProducesProblem(StatusCodes.Status404NotFound);
        Map(AlertVerb.Acknowledge, "acknowledge", "Say that you know of it");
        Map(AlertVerb.Shelve, "shelve", "Put it aside for a time");
        Map(AlertVerb.Unshelve, "unshelve", "Take it back from the shelf");
        Map(AlertVerb.OutOfService, "out-of-service", "Take its channels out of use for maintenance; a second time brings them back");

        void Map(AlertVerb verb, string path, string summary) => api.MapPost(
                $"/alerts/{{id}}/{path}",
                (string id, HttpRequest request, IFleet fleet, IHistory history, TimeProvider time, CancellationToken cancellation) =>
                    ActAsync(verb, id, request, fleet, history, time, cancellation))
            .WithSummary(summary).AddOpenApiOperationTransformer(DescribeBodyAsync).Produces<AlertEvent>()
            .ProducesProblem(StatusCodes.Status400BadRequest).ProducesProblem(StatusCodes.Status403Forbidden).ProducesProblem(StatusCodes.Status404NotFound)
            .ProducesProblem(StatusCodes.Status409Conflict).ProducesProblem(StatusCodes.Status415UnsupportedMediaType);
    }

    // Told to routing as well, another content type would get an answer without a body instead of a problem that says what to send.
    private static async Task DescribeBodyAsync(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        OpenApiSchema schema = await context.GetOrCreateSchemaAsync(typeof(AlertActionBody), cancellationToken: cancellation);
        operation.RequestBody = new OpenApiRequestBody
        {
            Required = true,
            Content = new Dictionary<string, OpenApiMediaType> { ["application/json"] = new() { Schema = schema } },
        };
    }

    private static async Task<IResult> ListAsync(
        [FromQuery, Description("Only this array")] string? array,
        [FromQuery, Description("Only this state, as in alert messages")] string? state,
        [FromQuery, Description("Raised at or after this event time, RFC 3339")] string? from,
        [FromQuery, Description("Raised before this event time, RFC 3339")] string? to,
        [FromQuery, Description("At most this many, 1 to 10000; 1000 when left out")] string? limit,
        IFleet fleet, IHistory history, CancellationToken cancellation)
    {
        if (!string.IsNullOrEmpty(array) && fleet.Arrays.All(a => a.Id != array)) return ApiProblem.NoSuchArray(array, fleet.Arrays.Select(static a => a.Id));
        AlertState? wanted = null;
        if (!string.IsNullOrEmpty(state))
        {
            wanted = AlertStateWords.Parse(state);
            if (wanted is null) return ApiProblem.BadParameter("state", $"state is '{state}'; allowed are: {string.Join(", ", Enum.GetValues<AlertState>().Select(AlertStateWords.Key))}.");
        }
        DateTimeOffset? start = null, end = null;
        if (!string.IsNullOrEmpty(from))
        {
            if (!QueryText.TryTime(from, out DateTimeOffset t)) return ArrayEndpoints.BadTime("from", from);
            start = t;
        }
        if (!string.IsNullOrEmpty(to))
        {
            if (!QueryText.TryTime(to, out DateTimeOffset t)) return ArrayEndpoints.BadTime("to", to);
            end = t;
        }
        if (start >= end) return ApiProblem.BadParameter("from", $"from ({start:O}) is not before to ({end:O}).");
        int count = DefaultLimit;
        if (!string.IsNullOrEmpty(limit) && (!int.TryParse(limit, NumberStyles.None, CultureInfo.InvariantCulture, out count) || count is < 1 or > LargestLimit))
            return ApiProblem.BadParameter("limit", $"limit is '{limit}'; a whole number from 1 to {LargestLimit} is allowed.");

        string? only = string.IsNullOrEmpty(array) ? null : array;
        IReadOnlyList<AlertEvent> stored = await history.AlertsAsync(only, wanted, start, end, count, cancellation);
        IReadOnlyList<AlertEvent> open = fleet.OpenAlerts;

        // A store may lag behind the live state: what it says of an open alert does not count.
        HashSet<string> openIds = [.. open.Select(static a => a.Id)];
        IEnumerable<AlertEvent> live = open.Where(a => (only is null || a.Array == only) && (wanted is null || a.State == wanted)
            && !(a.Raised < start) && !(a.Raised >= end));
        return TypedResults.Ok(AlertList.Merge(live, stored.Where(a => !openIds.Contains(a.Id)), urgentFirst: false).Take(count).ToArray());
    }

    private static async Task<IResult> OneAsync(string id, IFleet fleet, IHistory history, CancellationToken cancellation)
    {
        IReadOnlyList<AlertEvent> changes = await history.AlertHistoryAsync(id, cancellation);
        AlertEvent? alert = fleet.OpenAlerts.FirstOrDefault(a => a.Id == id) ?? (changes.Count > 0 ? changes[^1] : null);
        return alert is null ? NoSuchAlert(id) : TypedResults.Ok(new AlertDetail(alert, changes, await history.AuditLogAsync(id, cancellation)));
    }

    private static async Task<IResult> ActAsync(
        AlertVerb verb, string id, HttpRequest request, IFleet fleet, IHistory history, TimeProvider time, CancellationToken cancellation)
    {
        if (!request.HasJsonContentType())
        {
            return ApiProblem.Of(StatusCodes.Status415UnsupportedMediaType, "Not JSON",
                "Send the body as JSON with the header 'Content-Type: application/json', for example {\"who\":\"A. Person\",\"why\":\"seen\"}.");
        }
        AlertActionBody? body;
        try
        {
            body = await request.ReadFromJsonAsync<AlertActionBody>(ReportJson.Options, cancellation);
        }
        catch (JsonException e)
        {
            return ApiProblem.BadParameter("body", $"The body cannot be read: {e.Message} It has who (text), why (text) and until (RFC 3339 time).");
        }
        string who = body?.Who?.Trim() ?? "", why = body?.Why?.Trim() ?? "";
        if (who.Length is 0 or > LongestWho) return ApiProblem.BadParameter("who", $"who has {who.Length} characters; 1 to {LongestWho} are allowed. It goes into the audit log.");
        if (why.Length > LongestWhy) return ApiProblem.BadParameter("why", $"why has {why.Length} characters; at most {LongestWhy} are allowed.");
        DateTimeOffset now = time.GetUtcNow();
        DateTimeOffset? until = verb is AlertVerb.Shelve or AlertVerb.OutOfService ? body?.Until : null;
        if (verb == AlertVerb.Shelve && until is null) return ApiProblem.BadParameter("until", "until is missing; shelving needs an end, at most a week ahead.");
        if (until <= now) return ApiProblem.BadParameter("until", $"until ({until:O}) is not in the future; the server's clock says {now:O}.");
        if (verb == AlertVerb.Shelve && until > now + _longestShelf) return ApiProblem.BadParameter("until", $"until ({until:O}) is more than a week ahead; at most {now + _longestShelf:O} is allowed.");

        AlertEvent? after;
        try
        {
            after = await fleet.ActAsync(new AlertAction(id, verb, who, why, until), cancellation);
        }
        catch (InvalidOperationException e)
        {
            return ApiProblem.Of(StatusCodes.Status409Conflict, "Not possible in this state", e.Message);
        }
        if (after is not null) return TypedResults.Ok(after);
        return (await history.AlertHistoryAsync(id, cancellation)).Count > 0
            ? ApiProblem.Of(StatusCodes.Status409Conflict, "No longer open", $"Alert '{id}' is back to normal; nothing can be done to it any more.")
            : NoSuchAlert(id);
    }

    private static ProblemHttpResult NoSuchAlert(string id) => ApiProblem.Of(
        StatusCodes.Status404NotFound, "No such alert", $"There is no alert '{id}'; /api/alerts lists those there are.");
}
