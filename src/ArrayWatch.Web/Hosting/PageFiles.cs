using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting.StaticWebAssets;
using Microsoft.Extensions.FileProviders;

namespace ArrayWatch.Web.Hosting;

/// <summary>
/// Serves style sheets and scripts wherever the program is started from. A built program finds them through the manifest
/// beside it, which the framework reads by itself only in development; a published one has them in its own wwwroot, which the
/// framework looks for in the working directory.
/// </summary>
internal static class PageFiles
{
    public static void ServePageFiles(this WebApplication app)
    {
        string published = Path.Combine(AppContext.BaseDirectory, "wwwroot");
        if (Directory.Exists(published)) app.Environment.WebRootFileProvider = new PhysicalFileProvider(published);
        else StaticWebAssetsLoader.UseStaticWebAssets(app.Environment, app.Configuration);
        app.MapStaticAssets();
    }
}
