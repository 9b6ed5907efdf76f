using System.Collections;
using System.Globalization;
using System.Text;
using System.Text.Json;

namespace ArrayWatch.Web.ViewModels;

/// <summary>
/// An alert's estimates as lines of text. Values come as numbers, arrays or maps when they are fresh, and as
/// JSON elements when a store kept them: both read the same.
/// </summary>
internal static class EstimateText
{
    private static readonly (string Ending, string Unit)[] _units =
    [
        ("PartsPerMillion", "ppm"), ("Microseconds", "µs"), ("Decibels", "dB"), ("Degrees", "°"), ("Metres", "m"), ("Hertz", "Hz"), ("Seconds", "s"),
    ];

    /// <summary>Each estimate as a name in words and a value with its unit.</summary>
    /// <param name="estimate">By contract name.</param>
    /// <param name="labels">Channel labels of the array, for maps from index to index; empty when the array is not known.</param>
    public static IReadOnlyList<NamedText> Lines(IReadOnlyDictionary<string, object> estimate, IReadOnlyList<string> labels)
    {
        List<NamedText> lines = [];
        foreach ((string key, object value) in estimate)
        {
            if (key.StartsWith("standardError", StringComparison.Ordinal)) continue;
            (string name, string unit) = Split(key);
            double? error = Number(estimate.GetValueOrDefault("standardError" + UnitEnding(key)));
            string text = key == "mapping" ? Mapping(Map(value), labels)
                : key is "from" or "into" && Number(value) is { } index ? Label(index, labels)
                : key == "dutyCycle" && Number(value) is { } duty ? (duty * 100).ToString("F0", CultureInfo.InvariantCulture) + " % of the time"
                : Value(value, error, unit);
            lines.Add(new(key == "mapping" ? "order found" : name, text));
        }
        return lines;
    }

    /// <summary>The number under a name; null when it is not there or not a number.</summary>
    public static double? Number(IReadOnlyDictionary<string, object> estimate, string key) => Number(estimate.GetValueOrDefault(key));

    /// <summary>Index → index it really carries; empty when there is none.</summary>
    public static IReadOnlyDictionary<int, int> Mapping(IReadOnlyDictionary<string, object> estimate) =>
        estimate.TryGetValue("mapping", out object? value) ? Map(value) : new Dictionary<int, int>();

    /// <summary>"excessDecibels" → "excess" and "dB".</summary>
    public static (string Name, string Unit) Split(string key)
    {
        string ending = UnitEnding(key);
        string unit = ending.Length == 0 ? "" : _units.First(u => u.Ending == ending).Unit;
        string stem = ending.Length == 0 || ending.Length == key.Length ? key : key[..^ending.Length];
        StringBuilder words = new();
        foreach (char c in stem)
        {
            if (char.IsUpper(c)) words.Append(' ').Append(char.ToLowerInvariant(c));
            else words.Append(c);
        }
        return (words.ToString().Trim(), unit);
    }

    private static string UnitEnding(string key) => _units.FirstOrDefault(u => key.EndsWith(u.Ending, StringComparison.Ordinal)).Ending ?? "";

    private static string Value(object value, double? error, string unit)
    {
        string suffix = unit is "" or "°" ? unit : " " + unit;
        if (Number(value) is { } number)
            return (error is { } e ? NumberText.WithError(number, e, 2) : unit == "" ? NumberText.General(number) : NumberText.Signed(number, 1)) + suffix;
        List<double> numbers = Numbers(value);
        if (numbers.Count == 0) return Plain(value);
        string shown = string.Join(", ", numbers.Take(8).Select(NumberText.General));
        return (numbers.Count > 8 ? string.Create(CultureInfo.InvariantCulture, $"{shown}, … ({numbers.Count} values)") : shown) + suffix;
    }

    private static string Mapping(IReadOnlyDictionary<int, int> map, IReadOnlyList<string> labels) =>
        string.Join(", ", map.OrderBy(static p => p.Key).Select(p => $"{Label(p.Key, labels)} carries {Label(p.Value, labels)}"));

    private static string Label(double index, IReadOnlyList<string> labels) =>
        index >= 0 && index < labels.Count ? labels[(int)index] : string.Create(CultureInfo.InvariantCulture, $"index {index}");

    private static double? Number(object? value) => value switch
    {
        JsonElement { ValueKind: JsonValueKind.Number } e => e.GetDouble(),
        double or float or int or long or decimal => Convert.ToDouble(value, CultureInfo.InvariantCulture),
        _ => null,
    };

    private static List<double> Numbers(object value) => value switch
    {
        JsonElement { ValueKind: JsonValueKind.Array } e => [.. e.EnumerateArray().Select(static v => Number(v) ?? double.NaN)],
        string or IDictionary => [],
        IEnumerable many => [.. many.Cast<object?>().Select(static v => Number(v) ?? double.NaN)],
        _ => [],
    };

    private static Dictionary<int, int> Map(object value)
    {
        Dictionary<int, int> map = [];
        if (value is JsonElement { ValueKind: JsonValueKind.Object } e)
        {
            foreach (JsonProperty p in e.EnumerateObject()) Add(p.Name, Number(p.Value));
        }
        else if (value is IDictionary pairs)
        {
            foreach (DictionaryEntry p in pairs) Add(Convert.ToString(p.Key, CultureInfo.InvariantCulture), Number(p.Value));
        }
        return map;

        void Add(string? key, double? carried)
        {
            if (int.TryParse(key, NumberStyles.None, CultureInfo.InvariantCulture, out int index) && carried is { } c) map[index] = (int)c;
        }
    }

    private static string Plain(object value) => value is JsonElement e ? e.ToString() : Convert.ToString(value, CultureInfo.InvariantCulture) ?? "";
}

/// <summary>A name and what belongs to it, both as text.</summary>
internal sealed record NamedText(string Name, string Text);
