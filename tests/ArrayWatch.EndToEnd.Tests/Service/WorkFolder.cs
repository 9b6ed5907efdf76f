using System.Text.Json.Nodes;

namespace ArrayWatch.EndToEnd.Tests.Service;

/// <summary>A folder for one run's configuration and store, gone afterwards.</summary>
internal sealed class WorkFolder : IDisposable
{
    private readonly string _folder = Directory.CreateTempSubdirectory("arraywatch-service-").FullName;

    /// <summary>Path of a file in it.</summary>
    public string PathOf(string name) => Path.Combine(_folder, name);

    /// <summary>Writes a configuration and answers its path.</summary>
    public string Write(JsonObject configuration)
    {
        string file = PathOf("arraywatch.json");
        File.WriteAllText(file, configuration.ToJsonString());
        return file;
    }

    /// <summary>A small configuration: one line of eight channels, a broker, pages or none.</summary>
    public static JsonObject Small(int brokerPort, int? webPort, bool embedded = false)
    {
        JsonObject configuration = new()
        {
            ["broker"] = new JsonObject { ["embedded"] = embedded, ["port"] = brokerPort },
            ["store"] = new JsonObject { ["path"] = "store.db" },
            ["arrays"] = new JsonArray(new JsonObject
            {
                ["id"] = "aft",
                ["medium"] = new JsonObject { ["soundSpeed"] = 1500 },
                ["line"] = new JsonObject { ["count"] = 8, ["spacing"] = 0.75, ["labelPrefix"] = "H" },
            }),
        };
        if (webPort is { } port) configuration["web"] = new JsonObject { ["url"] = $"http://127.0.0.1:{port}" };
        return configuration;
    }

    /// <inheritdoc/>
    public void Dispose() => Directory.Delete(_folder, recursive: true);
}
