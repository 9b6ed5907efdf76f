namespace ArrayWatch.Messaging.Outbound;

/// <summary>The retained message under {prefix}/service/status.</summary>
/// <param name="State">"online" or "offline".</param>
/// <param name="Time">Wall clock; null in the will, which is written before the end.</param>
/// <param name="Version">Version of the service.</param>
/// <param name="Arrays">Ids of the arrays that it watches.</param>
internal sealed record ServiceStatus(string State, DateTimeOffset? Time, string? Version, IReadOnlyList<string>? Arrays);
