using ArrayWatch.Web.Live;
using Microsoft.AspNetCore.Http;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Web.Api;

/// <summary>Answers a failing store with a problem instead of a bare error, and writes the cause to the log.</summary>
internal sealed partial class ApiFailures : IEndpointFilter
{
    public async ValueTask<object?> InvokeAsync(EndpointFilterInvocationContext context, EndpointFilterDelegate next)
    {
        try
        {
            return await next(context);
        }
        catch (Exception e) when (StoreTrouble.Is(e))
        {
            LogFailed(context.HttpContext.RequestServices.GetRequiredService<ILogger<ApiFailures>>(), e, context.HttpContext.Request.Path);
            return ApiProblem.Of(StatusCodes.Status503ServiceUnavailable, "Store not readable", StoreTrouble.Sentence);
        }
    }

    [LoggerMessage(EventId = 7002, Level = LogLevel.Error, Message = "Answering {Path} failed")]
    private static partial void LogFailed(ILogger logger, Exception exception, string path);
}
