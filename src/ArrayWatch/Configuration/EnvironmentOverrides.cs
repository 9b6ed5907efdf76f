using System.Collections;
using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace ArrayWatch.Configuration;

/// <summary>
/// Lays variables like <c>ARRAYWATCH__arrays__0__id</c> over the document. Names are taken as they stand or, where the document
/// has such a key, in any case. A value that starts with <c>[</c> or <c>{</c> is read as JSON; every other is text until
/// its reader knows what it should be.
/// </summary>
internal sealed class EnvironmentOverrides
{
    /// <summary>What the variables' names start with.</summary>
    public const string Prefix = "ARRAYWATCH__";

    private readonly Dictionary<JsonNode, string> _origins = new(ReferenceEqualityComparer.Instance);
    private readonly List<KeyValuePair<string, string>> _variables;

    /// <summary>Takes the variables of an environment that begin with <see cref="Prefix"/>.</summary>
    public EnvironmentOverrides(IDictionary environment)
    {
        _variables = [.. environment.Cast<DictionaryEntry>()
            .Select(static e => new KeyValuePair<string, string>((string)e.Key, e.Value as string ?? ""))
            .Where(static e => e.Key.StartsWith(Prefix, StringComparison.OrdinalIgnoreCase))
            .OrderBy(static e => e.Key, StringComparer.Ordinal)];
    }

    /// <summary>The variable that a value came from; null when it stands in the file.</summary>
    public string? Origin(JsonNode node) => _origins.GetValueOrDefault(node);

    /// <summary>Changes the document.</summary>
    public void Apply(JsonObject document, ConfigurationReport report)
    {
        foreach ((string variable, string value) in _variables)
        {
            string[] names = variable[Prefix.Length..].Split("__");
            if (Value(variable, value, report) is not { } node) continue;
            _origins[node] = variable;
            if (names.Any(string.IsNullOrEmpty)) report.Add(variable, $"the name has an empty part; write {Prefix}section__key");
            else if (!Set(document, names, node)) report.Add(variable, "leads to no place in the configuration; array elements are counted from 0 without a gap");
        }
    }

    private static JsonNode? Value(string variable, string text, ConfigurationReport report)
    {
        if (!text.StartsWith('[') && !text.StartsWith('{')) return JsonValue.Create(text);
        try
        {
            return JsonNode.Parse(text);
        }
        catch (JsonException exception)
        {
            report.Add(variable, $"'{text}' is not JSON ({exception.Message}); a value that starts with [ or {{ must be");
            return null;
        }
    }

    private static bool Set(JsonNode parent, ReadOnlySpan<string> names, JsonNode value)
    {
        bool last = names.Length == 1;
        switch (parent)
        {
            case JsonObject section:
                string key = section.Select(static p => p.Key).FirstOrDefault(NameIs(names[0])) ?? names[0];
                if (last) section[key] = value;
                else if (section[key] is null) section[key] = IsIndex(names[1]) ? new JsonArray() : new JsonObject();
                return last || Set(section[key]!, names[1..], value);
            case JsonArray list when IsIndex(names[0]):
                int index = int.Parse(names[0], NumberStyles.None, CultureInfo.InvariantCulture);
                if (index > list.Count) return false;
                if (index == list.Count) list.Add(last ? value : new JsonObject());
                else if (last) list[index] = value;
                return last || (list[index] is { } element && Set(element, names[1..], value));
            default:
                return false;
        }
    }

    private static Func<string, bool> NameIs(string name) => key => key.Equals(name, StringComparison.OrdinalIgnoreCase);

    private static bool IsIndex(string name) => name.Length is > 0 and < 5 && name.All(char.IsAsciiDigit);
}
