using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace ArrayWatch.Configuration;

/// <summary>
/// One object of the document. Each reader notes what is wrong and answers the fallback, so that all errors come out in one go;
/// <see cref="Close"/> then reports the keys that nobody asked for.
/// </summary>
internal sealed class Section(JsonObject node, string path, EnvironmentOverrides environment, ConfigurationReport report)
{
    private readonly HashSet<string> _known = new(StringComparer.Ordinal);

    /// <summary>Where a key of this section stands in the document.</summary>
    public string PathOf(string key) => path.Length == 0 ? key : $"{path}.{key}";

    /// <summary>True when the key is there and not null.</summary>
    public bool Has(string key) => Find(key) is not null;

    /// <summary>True when the value comes from the environment.</summary>
    public bool IsFromEnvironment(string key) => Find(key) is { } value && environment.Origin(value) is not null;

    /// <summary>Notes that something is wrong with a key of this section.</summary>
    public void Fail(string key, string what) =>
        report.Add(Find(key) is { } value && environment.Origin(value) is { } variable ? $"{PathOf(key)} (from {variable})" : PathOf(key), what);

    /// <summary>Notes that something is wrong with the section as a whole.</summary>
    public void Fail(string what) => report.Add(path.Length == 0 ? "the configuration" : path, what);

    /// <summary>A number in a range, both ends included; the fallback when it is left out.</summary>
    /// <param name="key">Its key.</param>
    /// <param name="fallback">What it is when left out; null: it must be given.</param>
    /// <param name="minimum">Smallest allowed.</param>
    /// <param name="maximum">Largest allowed.</param>
    /// <param name="unit">Its unit, for the message.</param>
    public double Number(string key, double? fallback, double minimum, double maximum, string unit)
    {
        string range = string.Create(CultureInfo.InvariantCulture, $"{unit} from {minimum} to {maximum}");
        if (Find(key) is not { } value)
        {
            if (fallback is null) Fail(key, $"is missing; give {range}");
            return fallback ?? minimum;
        }

        if (AsNumber(value) is { } number && number >= minimum && number <= maximum) return number;
        Fail(key, $"{Shown(value)} is not allowed; give {range}");
        return fallback ?? minimum;
    }

    /// <summary>A whole number in a range, both ends included; the fallback when it is left out.</summary>
    public int Whole(string key, int? fallback, int minimum, int maximum, string unit)
    {
        string range = string.Create(CultureInfo.InvariantCulture, $"{unit} from {minimum} to {maximum}");
        if (Find(key) is not { } value)
        {
            if (fallback is null) Fail(key, $"is missing; give {range}");
            return fallback ?? minimum;
        }

        if (AsNumber(value) is { } number && number >= minimum && number <= maximum && double.IsInteger(number)) return (int)number;
        Fail(key, $"{Shown(value)} is not allowed; give a whole number: {range}");
        return fallback ?? minimum;
    }

    /// <summary>True or false; the fallback when it is left out.</summary>
    public bool Flag(string key, bool fallback)
    {
        if (Find(key) is not { } value) return fallback;
        if (value.GetValueKind() is JsonValueKind.True or JsonValueKind.False) return value.GetValue<bool>();
        if (environment.Origin(value) is not null && bool.TryParse(value.GetValue<string>(), out bool given)) return given;
        Fail(key, $"{Shown(value)} is not allowed; give true or false");
        return fallback;
    }

    /// <summary>Text; the fallback when it is left out.</summary>
    /// <param name="key">Its key.</param>
    /// <param name="fallback">What it is when left out.</param>
    /// <param name="isAllowed">Tells whether a text will do; null: any that is not blank.</param>
    /// <param name="allowed">What is allowed, for the message.</param>
    public string? Text(string key, string? fallback, Func<string, bool>? isAllowed = null, string allowed = "a text that is not empty")
    {
        if (Find(key) is not { } value) return fallback;
        if (value.GetValueKind() == JsonValueKind.String)
        {
            string text = value.GetValue<string>();
            if (isAllowed is null ? !string.IsNullOrWhiteSpace(text) : isAllowed(text)) return text;
        }

        Fail(key, $"{Shown(value)} is not allowed; give {allowed}");
        return fallback;
    }

    /// <summary>Text that must be given; empty when it is not.</summary>
    public string RequiredText(string key, string allowed, Func<string, bool>? isAllowed = null)
    {
        if (!Has(key)) Fail(key, $"is missing; give {allowed}");
        return Text(key, "", isAllowed, allowed)!;
    }

    /// <summary>One of a few words; the fallback when it is left out.</summary>
    public T Choice<T>(string key, T fallback, params (string Word, T Meaning)[] choices)
    {
        if (Find(key) is not { } value) return fallback;
        string? given = value.GetValueKind() == JsonValueKind.String ? value.GetValue<string>() : null;
        foreach ((string word, T meaning) in choices)
        {
            if (word == given) return meaning;
        }

        Fail(key, $"{Shown(value)} is not allowed; give one of {string.Join(", ", choices.Select(static c => $"'{c.Word}'"))}");
        return fallback;
    }

    /// <summary>A list of words; the fallback when it is left out.</summary>
    public IReadOnlyList<string> Words(string key, IReadOnlyList<string> fallback, IReadOnlyCollection<string> known)
    {
        if (Find(key) is not { } value) return fallback;
        string all = string.Join(", ", known.Select(static k => $"'{k}'"));
        if (value is not JsonArray { Count: > 0 } list)
        {
            Fail(key, $"{Shown(value)} is not allowed; give a list of {all}");
            return fallback;
        }

        List<string> words = [];
        for (int i = 0; i < list.Count; i++)
        {
            string where = $"{PathOf(key)}[{i}]";
            string? word = list[i]?.GetValueKind() == JsonValueKind.String ? list[i]!.GetValue<string>() : null;
            if (word is null || !known.Contains(word)) report.Add(where, $"{Shown(list[i])} is not known; known are {all}");
            else if (words.Contains(word)) report.Add(where, $"'{word}' stands twice; name each once");
            else words.Add(word);
        }

        return words;
    }

    /// <summary>Three numbers; null when they are missing or wrong, which is noted.</summary>
    public double[]? Triple(string key, double limit, string unit)
    {
        string allowed = string.Create(CultureInfo.InvariantCulture, $"give [x, y, z], each {unit} from {-limit} to {limit}");
        if (Find(key) is not { } value)
        {
            Fail(key, $"is missing; {allowed}");
            return null;
        }

        double?[] numbers = value is JsonArray list ? [.. list.Select(n => n is null ? null : AsNumber(n))] : [];
        if (numbers.Length == 3 && numbers.All(n => n is { } x && Math.Abs(x) <= limit)) return [.. numbers.Select(static n => n!.Value)];
        Fail(key, $"{Shown(value)} is not allowed; {allowed}");
        return null;
    }

    /// <summary>A section in this one; null when it is left out or no object, which is noted.</summary>
    public Section? Child(string key)
    {
        if (Find(key) is not { } value) return null;
        if (value is JsonObject child) return new(child, PathOf(key), environment, report);
        Fail(key, $"{Shown(value)} is not allowed; give an object {{ … }}");
        return null;
    }

    /// <summary>A list of sections; empty when it is left out or no list of objects, which is noted.</summary>
    public IReadOnlyList<Section> Children(string key)
    {
        if (Find(key) is not { } value) return [];
        if (value is not JsonArray list)
        {
            Fail(key, $"{Shown(value)} is not allowed; give a list [ {{ … }}, … ]");
            return [];
        }

        List<Section> children = [];
        for (int i = 0; i < list.Count; i++)
        {
            string where = $"{PathOf(key)}[{i}]";
            if (list[i] is JsonObject child) children.Add(new(child, where, environment, report));
            else report.Add(where, $"{Shown(list[i])} is not allowed; give an object {{ … }}");
        }

        return children;
    }

    /// <summary>Reports every key that no reader has asked for, with the nearest one that is known.</summary>
    public void Close()
    {
        foreach ((string key, JsonNode? value) in node)
        {
            if (_known.Contains(key)) continue;
            string origin = value is not null && environment.Origin(value) is { } variable ? $" (from {variable})" : "";
            report.Add(PathOf(key) + origin, $"is no known key; the nearest known one is '{NearestName.Of(key, _known)}'");
        }
    }

    private JsonNode? Find(string key)
    {
        _known.Add(key);
        if (node.TryGetPropertyValue(key, out JsonNode? value)) return value;
        // Some shells and service managers know variables in capitals only.
        (string other, value) = node.FirstOrDefault(p => p.Key.Equals(key, StringComparison.OrdinalIgnoreCase) && p.Value is { } v && IsAllFromEnvironment(v));
        if (value is not null) _known.Add(other);
        return value;
    }

    private bool IsAllFromEnvironment(JsonNode value) => environment.Origin(value) is not null || value switch
    {
        JsonObject section => section.All(p => p.Value is { } v && IsAllFromEnvironment(v)),
        JsonArray list => list.All(v => v is not null && IsAllFromEnvironment(v)),
        _ => false,
    };

    private double? AsNumber(JsonNode value) => value.GetValueKind() switch
    {
        JsonValueKind.Number when value.GetValue<double>() is var number && double.IsFinite(number) => number,
        JsonValueKind.String when environment.Origin(value) is not null
            && double.TryParse(value.GetValue<string>(), NumberStyles.Float, CultureInfo.InvariantCulture, out double number) && double.IsFinite(number) => number,
        _ => null,
    };

    private static string Shown(JsonNode? value)
    {
        string text = value?.ToJsonString(_plain) ?? "null";
        return text.Length <= 60 ? text : text[..57] + "…";
    }

    private static readonly JsonSerializerOptions _plain = new() { Encoder = System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping };
}
