using Microsoft.AspNetCore.Http;

namespace ArrayWatch.Web.Hosting;

/// <summary>Tells browsers to load nothing from elsewhere, to be framed by nobody, and to guess no content types.</summary>
internal sealed class SecurityHeaders(RequestDelegate next)
{
    // The chart component sets styles on elements and draws pictures through data and blob addresses.
    private const string Policy =
        "default-src 'self'; script-src 'self'; style-src 'self' 'unsafe-inline'; img-src 'self' data: blob:; " +
        "connect-src 'self'; object-src 'none'; base-uri 'self'; form-action 'self'; frame-ancestors 'none'";

    public Task InvokeAsync(HttpContext context)
    {
        IHeaderDictionary headers = context.Response.Headers;
        headers.ContentSecurityPolicy = Policy;
        headers.XContentTypeOptions = "nosniff";
        headers["Referrer-Policy"] = "no-referrer";
        headers["Cross-Origin-Opener-Policy"] = "same-origin";
        headers["Cross-Origin-Resource-Policy"] = "same-origin";
        return next(context);
    }
}
