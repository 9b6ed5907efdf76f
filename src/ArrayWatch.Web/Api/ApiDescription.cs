using Microsoft.AspNetCore.OpenApi;

namespace ArrayWatch.Web.Api;

/// <summary>The head of the OpenAPI description.</summary>
internal static class ApiDescription
{
    public static void Configure(OpenApiOptions options) => options.AddDocumentTransformer(static (document, _, _) =>
    {
        document.Info.Title = "ArrayWatch";
        document.Info.Version = "v1";
        document.Info.Description =
            "Standing of sensor arrays, their coherence, trends, corrections and alerts. Times are RFC 3339 in UTC; null where the data cannot tell; "
            + "errors are problem details (RFC 9457). Advisory only: not to be relied on alone for navigation, detection or safety monitoring.";
        return Task.CompletedTask;
    });
}
