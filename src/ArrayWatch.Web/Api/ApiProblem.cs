using Microsoft.AspNetCore.Http;
using Microsoft.AspNetCore.Http.HttpResults;

namespace ArrayWatch.Web.Api;

/// <summary>Errors as problem details (RFC 9457): what is wrong, where, and what to do.</summary>
internal static class ApiProblem
{
    public static ProblemHttpResult Of(int status, string title, string detail) =>
        TypedResults.Problem(detail: detail, title: title, statusCode: status);

    /// <summary>A parameter or a member of the body that cannot be used.</summary>
    public static ProblemHttpResult BadParameter(string name, string detail) => TypedResults.Problem(
        detail: detail, title: $"Bad {name}", statusCode: StatusCodes.Status400BadRequest,
        extensions: new Dictionary<string, object?> { ["parameter"] = name });

    public static ProblemHttpResult NoSuchArray(string id, IEnumerable<string> known) => Of(
        StatusCodes.Status404NotFound, "No such array",
        $"The configuration has no array '{id}'; it has: {string.Join(", ", known.DefaultIfEmpty("none"))}.");

    public static ProblemHttpResult NoDataYet(string id, string what) => Of(
        StatusCodes.Status404NotFound, "No data yet",
        $"Array '{id}' has no {what} yet; it comes once enough frames have arrived. Ask again later.");
}
