using ArrayWatch.Web.Api;
using ArrayWatch.Web.Components;
using ArrayWatch.Web.Hosting;
using Microsoft.AspNetCore.Builder;

namespace ArrayWatch.Web;

/// <summary>Puts the pages and the HTTP interface under the program's addresses.</summary>
public static class PagesEndpoints
{
    /// <summary>Maps every page, <c>/api/…</c>, <c>/openapi/v1.json</c> and the pages' own files.</summary>
    public static WebApplication MapPages(this WebApplication app)
    {
        ArgumentNullException.ThrowIfNull(app);
        app.ServePageFiles();
        app.UseMiddleware<SecurityHeaders>();
        app.UseMiddleware<SameOriginOnly>();
        app.UseAntiforgery();
        app.MapOpenApi();
        app.MapArrays();
        app.MapAlerts();
        app.MapRazorComponents<App>()
            .AddInteractiveServerRenderMode(static o => o.ContentSecurityFrameAncestorsPolicy = null);
        return app;
    }
}
