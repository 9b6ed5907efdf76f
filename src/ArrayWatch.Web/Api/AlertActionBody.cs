namespace ArrayWatch.Web.Api;

/// <summary>Who acts on an alert, why and until when.</summary>
/// <param name="Who">Name of the person; needed.</param>
/// <param name="Why">Reason; may be left out.</param>
/// <param name="Until">When shelving or out-of-service ends by itself; shelving needs it, at most a week ahead.</param>
public sealed record AlertActionBody(string? Who, string? Why, DateTimeOffset? Until);
