using ArrayWatch.Messaging;
using ArrayWatch.Monitoring;
using Serilog.Events;

namespace ArrayWatch.Configuration;

/// <summary>Binds the whole document.</summary>
/// <param name="folder">Where relative paths start: the configuration file's folder.</param>
internal sealed class ServiceReader(string folder)
{
    private const int MostMessageBytes = 255 * 1024 * 1024;
    private const string AddressExample = "http://127.0.0.1:8080";

    /// <summary>Reads every section and notes every error.</summary>
    public ServiceConfiguration Read(Section root)
    {
        root.Text("$schema", null);
        ServiceConfiguration configuration = new()
        {
            Broker = Broker(root.Child("broker")),
            Store = Store(root.Child("store")),
            Influx = Influx(root.Child("influx")),
            WebUrl = Web(root.Child("web")),
            Log = Log(root.Child("log")),
            Arrays = Arrays(root),
        };
        root.Close();
        return configuration;
    }

    private MqttOptions Broker(Section? section)
    {
        MqttOptions fallback = new();
        if (section is null) return fallback;
        bool embedded = section.Flag("embedded", false);
        if (embedded && section.Flag("tls", false))
            section.Fail("tls", "the embedded broker has no TLS; set it to false, or use a broker that has");
        if (!embedded && section.Flag("bindAll", false))
            section.Fail("bindAll", "has a meaning for an embedded broker only; leave it out, or set broker.embedded to true");
        MqttOptions options = new()
        {
            Embedded = embedded,
            EmbeddedOnAllAddresses = section.Flag("bindAll", false),
            Host = section.Text("host", fallback.Host, allowed: "a host name or an address")!,
            Port = section.Whole("port", fallback.Port, 1, 65535, "a port"),
            TopicPrefix = section.Text("topicPrefix", fallback.TopicPrefix, IsTopic, "a topic without + and #, and without / at its ends")!,
            ClientId = section.Text("clientId", fallback.ClientId, IsClientId, "1 to 100 letters, digits, '-', '_' or '.'")!,
            UserName = section.Text("username", null),
            Password = Secret(section, "password", "passwordFile"),
            PasswordFile = Resolve(section.Text("passwordFile", null, allowed: "the path of a file that holds the password")),
            SessionExpiry = TimeSpan.FromSeconds(section.Number("sessionExpiry", fallback.SessionExpiry.TotalSeconds, 0, 31_536_000, "seconds")),
            MaxMessageBytes = section.Whole("maxMessageBytes", fallback.MaxMessageBytes, 1024, MostMessageBytes, "bytes"),
            Version = section.Choice("protocol", fallback.Version, ("automatic", MqttVersion.Automatic), ("5", MqttVersion.Mqtt5), ("3.1.1", MqttVersion.Mqtt311)),
            UseTls = section.Flag("tls", false),
        };
        section.Close();
        return options;
    }

    private StoreSettings Store(Section? section)
    {
        const string Default = "data/arraywatch.db";
        if (section is null) return new(Resolve(Default)!, 400);
        StoreSettings settings = new(
            Resolve(section.Text("path", Default, allowed: "the path of the database file"))!,
            section.Whole("retentionDays", 400, 1, 36_500, "days"));
        section.Close();
        return settings;
    }

    private InfluxSettings? Influx(Section? section)
    {
        if (section is null) return null;
        string? url = section.RequiredText("url", "an address like http://127.0.0.1:8086", IsWebAddress);
        InfluxSettings settings = new(
            new Uri(url.Length == 0 ? AddressExample : url),
            section.RequiredText("organization", "the organization to write for"),
            section.RequiredText("bucket", "the bucket to write to"),
            Resolve(section.Text("tokenFile", null, allowed: "the path of a file that holds the token")),
            Secret(section, "token", "tokenFile"));
        section.Close();
        return settings;
    }

    private static Uri? Web(Section? section)
    {
        if (section is null) return null;
        string url = section.RequiredText("url", $"http://, an address or a name, and a port, as in {AddressExample}", IsListenAddress);
        section.Close();
        return new Uri(url.Length == 0 ? AddressExample : url);
    }

    private LogSettings Log(Section? section)
    {
        if (section is null) return new(null, LogEventLevel.Information);
        LogSettings settings = new(
            Resolve(section.Text("folder", null, allowed: "the path of a folder")),
            section.Choice("level", LogEventLevel.Information,
                ("debug", LogEventLevel.Debug), ("information", LogEventLevel.Information), ("warning", LogEventLevel.Warning), ("error", LogEventLevel.Error)));
        section.Close();
        return settings;
    }

    private static List<ArrayDefinition> Arrays(Section root)
    {
        List<ArrayDefinition> arrays = [];
        IReadOnlyList<Section> sections = root.Children("arrays");
        if (sections.Count == 0) root.Fail("arrays", "at least one array is needed; see the examples in config/");
        HashSet<string> ids = new(StringComparer.Ordinal);
        foreach (Section section in sections)
        {
            string id = section.RequiredText("id", ArrayReader.IdRange, ArrayReader.IsId);
            if (id.Length > 0 && !ids.Add(id)) section.Fail("id", $"'{id}' is another array's id too; each needs its own");
            if (ArrayReader.Read(section, id) is { } array) arrays.Add(array);
            section.Close();
        }

        return arrays;
    }

    private static string? Secret(Section section, string key, string fileKey)
    {
        if (!section.Has(key)) return null;
        if (section.IsFromEnvironment(key))
        {
            if (section.Has(fileKey)) section.Fail(key, $"and {fileKey} are both given; give one of them");
            return section.Text(key, null, static _ => true);
        }

        string variable = EnvironmentOverrides.Prefix + section.PathOf(key).Replace(".", "__", StringComparison.Ordinal);
        section.Fail(key, $"a secret does not belong in the configuration; put it into a file named by {fileKey}, or into the variable {variable}");
        return null;
    }

    private string? Resolve(string? path) => path is null ? null : Path.GetFullPath(path, folder);

    private static bool IsTopic(string text) =>
        text.Length is > 0 and <= 200 && text.IndexOfAny(['+', '#', '\0']) < 0 && text[0] != '/' && text[^1] != '/' && text[0] != '$';

    private static bool IsClientId(string text) =>
        text.Length is > 0 and <= 100 && text.All(static c => char.IsAsciiLetterOrDigit(c) || c is '-' or '_' or '.');

    private static bool IsWebAddress(string text) =>
        Uri.TryCreate(text, UriKind.Absolute, out Uri? uri) && uri.Scheme is "http" or "https" && uri.UserInfo.Length == 0;

    private static bool IsListenAddress(string text) =>
        Uri.TryCreate(text, UriKind.Absolute, out Uri? uri) && uri.Scheme == "http" && uri.UserInfo.Length == 0
        && uri.PathAndQuery == "/" && uri.Fragment.Length == 0 && uri.Port > 0;
}
