using ArrayWatch.Messaging;
using ArrayWatch.Monitoring;

namespace ArrayWatch.Configuration;

/// <summary>Everything that a valid configuration says. Immutable; paths are absolute.</summary>
internal sealed record ServiceConfiguration
{
    /// <summary>How to reach the broker.</summary>
    public required MqttOptions Broker { get; init; }

    /// <summary>Where the store is.</summary>
    public required StoreSettings Store { get; init; }

    /// <summary>A second home for metrics; null for none.</summary>
    public InfluxSettings? Influx { get; init; }

    /// <summary>Where pages and HTTP are served; null for no HTTP at all.</summary>
    public Uri? WebUrl { get; init; }

    /// <summary>What is logged, and where.</summary>
    public required LogSettings Log { get; init; }

    /// <summary>The arrays to watch, ids distinct; at least one.</summary>
    public required IReadOnlyList<ArrayDefinition> Arrays { get; init; }
}

/// <summary>Where the store is.</summary>
/// <param name="Path">The database file.</param>
/// <param name="RetentionDays">How long metrics are kept.</param>
internal sealed record StoreSettings(string Path, int RetentionDays);

/// <summary>A server that takes the InfluxDB line protocol.</summary>
/// <param name="Url">Its address.</param>
/// <param name="Organization">Organization to write for.</param>
/// <param name="Bucket">Bucket to write to.</param>
/// <param name="TokenFile">A file that holds the token; null for none.</param>
/// <param name="Token">The token itself, from the environment; null for none.</param>
internal sealed record InfluxSettings(Uri Url, string Organization, string Bucket, string? TokenFile, string? Token);

/// <summary>What is logged, and where.</summary>
/// <param name="Folder">Where daily files go; null for the console alone.</param>
/// <param name="Level">The least weighty entries that are kept.</param>
internal sealed record LogSettings(string? Folder, Serilog.Events.LogEventLevel Level);
