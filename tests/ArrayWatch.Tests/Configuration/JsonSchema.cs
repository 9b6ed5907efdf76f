using System.Text.Json;
using System.Text.Json.Nodes;
using System.Text.RegularExpressions;

namespace ArrayWatch.Tests.Configuration;

/// <summary>The keywords of JSON Schema 2020-12 that the configuration's schema uses; an unknown keyword fails the test.</summary>
internal sealed class JsonSchema(JsonObject root)
{
    private static readonly HashSet<string> _notes = ["$schema", "$defs", "title", "description", "default"];

    public static JsonSchema OfConfiguration() =>
        new(JsonNode.Parse(File.ReadAllText(Repository.PathOf("config", "arraywatch.schema.json")))!.AsObject());

    public JsonObject Root => root;

    public IReadOnlyList<string> Validate(JsonNode? value)
    {
        List<string> errors = [];
        Check(root, value, "", errors);
        return errors;
    }

    /// <summary>Follows a reference inside the document.</summary>
    public JsonObject Resolve(JsonObject schema) => schema["$ref"]?.GetValue<string>() is { } reference
        ? reference[2..].Split('/').Aggregate((JsonNode)root, static (node, name) => node[name]!).AsObject()
        : schema;

    private void Check(JsonObject given, JsonNode? value, string path, List<string> errors)
    {
        JsonObject schema = Resolve(given);
        foreach ((string keyword, JsonNode? argument) in schema)
        {
            if (!_notes.Contains(keyword) && !Holds(schema, keyword, argument!, value, path, errors)) errors.Add($"{path}: {keyword}");
        }
    }

    private bool Holds(JsonObject schema, string keyword, JsonNode argument, JsonNode? value, string path, List<string> errors)
    {
        JsonValueKind kind = value?.GetValueKind() ?? JsonValueKind.Null;
        switch (keyword)
        {
            case "type":
                return argument.GetValue<string>() switch
                {
                    "object" => kind == JsonValueKind.Object,
                    "array" => kind == JsonValueKind.Array,
                    "string" => kind == JsonValueKind.String,
                    "boolean" => kind is JsonValueKind.True or JsonValueKind.False,
                    "number" => kind == JsonValueKind.Number,
                    "integer" => kind == JsonValueKind.Number && double.IsInteger(value!.GetValue<double>()),
                    string other => throw new NotSupportedException(other),
                };
            case "properties":
                foreach ((string name, JsonNode? child) in Members(value))
                {
                    if (argument[name] is JsonObject property) Check(property, child, $"{path}.{name}", errors);
                }

                return true;
            case "additionalProperties":
                return Members(value).All(p => schema["properties"]![p.Key] is not null);
            case "required":
                return argument.AsArray().All(name => value is JsonObject o && o.ContainsKey(name!.GetValue<string>()));
            case "items":
                if (value is JsonArray list)
                {
                    for (int i = 0; i < list.Count; i++) Check(argument.AsObject(), list[i], $"{path}[{i}]", errors);
                }

                return true;
            case "oneOf":
                return argument.AsArray().Count(option =>
                {
                    List<string> inner = [];
                    Check(option!.AsObject(), value, path, inner);
                    return inner.Count == 0;
                }) == 1;
            case "enum": return argument.AsArray().Any(v => JsonNode.DeepEquals(v, value));
            case "minimum": return kind != JsonValueKind.Number || value!.GetValue<double>() >= argument.GetValue<double>();
            case "maximum": return kind != JsonValueKind.Number || value!.GetValue<double>() <= argument.GetValue<double>();
            case "minLength": return kind != JsonValueKind.String || value!.GetValue<string>().Length >= argument.GetValue<int>();
            case "maxLength": return kind != JsonValueKind.String || value!.GetValue<string>().Length <= argument.GetValue<int>();
            case "pattern": return kind != JsonValueKind.String || Regex.IsMatch(value!.GetValue<string>(), argument.GetValue<string>());
            case "minItems": return value is not JsonArray a || a.Count >= argument.GetValue<int>();
            case "maxItems": return value is not JsonArray b || b.Count <= argument.GetValue<int>();
            case "uniqueItems": return value is not JsonArray c || c.Select(static v => v?.ToJsonString()).Distinct().Count() == c.Count;
            case "minProperties": return value is not JsonObject d || d.Count >= argument.GetValue<int>();
            case "maxProperties": return value is not JsonObject e || e.Count <= argument.GetValue<int>();
            default: throw new NotSupportedException($"The schema uses '{keyword}', which this checker does not know.");
        }
    }

    private static IEnumerable<KeyValuePair<string, JsonNode?>> Members(JsonNode? value) => value as JsonObject ?? [];
}
