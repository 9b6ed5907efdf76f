namespace ArrayWatch.Storage;

/// <summary>Where copies go: a server that takes InfluxDB 2 writes.</summary>
/// <param name="Url">Base address.</param>
/// <param name="Organization">Organization of the bucket.</param>
/// <param name="Bucket">Bucket to write to.</param>
/// <param name="Token">Token with the right to write; empty for a server that asks for none.</param>
public sealed record InfluxOptions(Uri Url, string Organization, string Bucket, string Token);
