using ArrayWatch.Web.Api;
using Microsoft.AspNetCore.Http;

namespace ArrayWatch.Web.Hosting;

/// <summary>
/// Refuses what another site's page makes a browser send: anything that could change something, and circuits. A browser states
/// the page's origin in such requests; programs that are no browsers state none and pass.
/// </summary>
internal sealed class SameOriginOnly(RequestDelegate next)
{
    public Task InvokeAsync(HttpContext context)
    {
        HttpRequest request = context.Request;
        bool reads = HttpMethods.IsGet(request.Method) || HttpMethods.IsHead(request.Method) || HttpMethods.IsOptions(request.Method);
        if (reads && !request.Path.StartsWithSegments("/_blazor")) return next(context);
        string? origin = request.Headers.Origin;
        string? site = request.Headers["Sec-Fetch-Site"];
        bool foreign = (!string.IsNullOrEmpty(origin) && !IsOwn(origin, request))
            || (!string.IsNullOrEmpty(site) && site is not ("same-origin" or "none"));
        return foreign
            ? ApiProblem.Of(StatusCodes.Status403Forbidden, "Request from another site",
                $"This request comes from a page of {(string.IsNullOrEmpty(origin) ? "another site" : origin)}; only this service's own pages and programs that are no browsers may send it.").ExecuteAsync(context)
            : next(context);
    }

    private static bool IsOwn(string origin, HttpRequest request) =>
        Uri.TryCreate(origin, UriKind.Absolute, out Uri? uri)
        && string.Equals(uri.Authority, request.Host.ToUriComponent(), StringComparison.OrdinalIgnoreCase);
}
