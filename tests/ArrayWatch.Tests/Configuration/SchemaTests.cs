using System.Collections;
using System.Text.Json.Nodes;
using ArrayWatch.Configuration;
using ArrayWatch.NoiseField;

namespace ArrayWatch.Tests.Configuration;

public sealed class SchemaTests
{
    /// <summary>Every key that the schema has, with a value that the schema allows.</summary>
    private const string Full = """
        {
          "$schema": "arraywatch.schema.json",
          "broker": { "embedded": false, "host": "h", "port": 1883, "topicPrefix": "a/b", "clientId": "c", "username": "u", "passwordFile": "p",
                      "sessionExpiry": 60, "maxMessageBytes": 65536, "protocol": "5", "tls": true, "bindAll": false },
          "store": { "path": "x.db", "retentionDays": 3 },
          "influx": { "url": "http://127.0.0.1:8086", "organization": "o", "bucket": "b", "tokenFile": "t" },
          "web": { "url": "http://127.0.0.1:8080" },
          "log": { "folder": "logs", "level": "debug" },
          "arrays": [
            { "id": "a", "medium": { "soundSpeed": 1500 },
              "line": { "count": 32, "spacing": 0.75, "axis": [1, 0, 0], "labelPrefix": "H", "firstLabel": 1, "groupSize": 8 },
              "averaging": { "timeConstant": 60, "slowTimeConstant": 100000 },
              "noiseField": { "components": ["isotropic", "plane-waves", "channel-noise", "surface"] },
              "tolerances": { "gainDecibels": 3, "phaseDegrees": 15, "delayMicroseconds": 50, "excessDecibels": 6 },
              "falseAlertsPerMonth": 1, "phaseConvention": "conjugate", "silenceLimit": 60,
              "lookDirections": [ { "name": "ahead", "azimuth": 0, "elevation": 0 } ] },
            { "id": "b", "medium": { "seaWater": { "temperature": 10, "salinity": 35, "depth": 5 } },
              "channels": [ { "label": "1", "position": [0, 0, 0], "group": "A" }, { "label": "2", "position": [0, 1, 0], "group": "A" } ] },
            { "id": "c", "medium": { "air": { "temperature": 10, "humidity": 35, "pressure": 100 } },
              "channels": [ { "label": "1", "position": [0, 0, 0] }, { "label": "2", "position": [0, 1, 0] } ] }
          ]
        }
        """;

    private static readonly JsonSchema _schema = JsonSchema.OfConfiguration();

    public static TheoryData<string> Examples => [.. Repository.Examples.Select(static f => Path.GetFileName(f))];

    [Theory]
    [MemberData(nameof(Examples))]
    public void Each_example_fits_the_schema_and_is_accepted(string name)
    {
        string file = Repository.PathOf("config", name);
        Assert.Empty(_schema.Validate(JsonNode.Parse(File.ReadAllText(file))));
        Assert.NotEmpty(ConfigurationFile.Load(file, new Hashtable()).Arrays);
    }

    [Fact]
    public void The_examples_of_the_read_me_fit_the_schema_and_are_accepted()
    {
        string[] blocks = [.. File.ReadAllText(Repository.PathOf("README.md")).Split("```json\n").Skip(1).Select(static b => b.Split("```")[0]).Where(static b => b.Contains("\"arrays\"", StringComparison.Ordinal))];
        Assert.NotEmpty(blocks);
        foreach (string block in blocks)
        {
            Assert.Empty(_schema.Validate(JsonNode.Parse(block)));
            Assert.NotEmpty(ConfigurationFile.Parse(block, "/etc/arraywatch/arraywatch.json", new Hashtable()).Arrays);
        }
    }

    [Fact]
    public void A_configuration_with_every_key_is_accepted()
    {
        Assert.Empty(_schema.Validate(JsonNode.Parse(Full)));
        Assert.Equal(3, Load(JsonNode.Parse(Full)!).Arrays.Count);
    }

    [Fact]
    public void Every_number_is_accepted_at_both_ends_of_its_range_and_refused_beyond()
    {
        int tried = 0;
        foreach (Place place in Places(_schema.Root, JsonNode.Parse(Full)!.AsObject(), []).Where(static p => p.Schema["minimum"] is not null))
        {
            double minimum = place.Schema["minimum"]!.GetValue<double>(), maximum = place.Schema["maximum"]!.GetValue<double>();
            bool whole = place.Schema["type"]!.GetValue<string>() == "integer";
            foreach (double value in (double[])[minimum, maximum])
                Assert.DoesNotContain(Errors(place.With(value)), e => e.StartsWith($"{place.Path}:", StringComparison.Ordinal) && e.Contains("is not allowed; give", StringComparison.Ordinal) && !e.Contains("direction", StringComparison.Ordinal));
            double step = whole ? 1 : Math.Max(Math.Abs(minimum), 1) * 1e-3;
            foreach (double value in (double[])[minimum - step, maximum + Math.Max(step, Math.Abs(maximum) * 1e-9)])
                Assert.Contains(Errors(place.With(value)), e => e.StartsWith(place.ListPath + ":", StringComparison.Ordinal));
            if (whole) Assert.Contains(Errors(place.With(minimum + 0.5)), e => e.StartsWith($"{place.Path}:", StringComparison.Ordinal));
            tried++;
        }

        Assert.True(tried > 30, $"only {tried} numbers were found");
    }

    [Fact]
    public void Every_word_of_a_choice_is_accepted_and_another_refused()
    {
        foreach (Place place in Places(_schema.Root, JsonNode.Parse(Full)!.AsObject(), []).Where(static p => p.Schema["enum"] is not null))
        {
            foreach (JsonNode? word in place.Schema["enum"]!.AsArray())
                Assert.DoesNotContain(Errors(place.With(word!.DeepClone())), e => e.StartsWith($"{place.Path}:", StringComparison.Ordinal) && e.Contains(" known", StringComparison.Ordinal));
            Assert.Contains(Errors(place.With("other")), e => e.StartsWith($"{place.Path}:", StringComparison.Ordinal));
        }
    }

    [Fact]
    public void Every_default_of_the_schema_is_what_is_used_when_the_key_is_left_out()
    {
        foreach (Place place in Places(_schema.Root, JsonNode.Parse(Full)!.AsObject(), []).Where(static p => p.Schema["default"] is not null))
        {
            JsonNode without = place.Without(), with = place.With(place.Schema["default"]!.DeepClone());
            if (Errors(with).Count > 0) continue;
            Assert.Equal(Text(Load(with)), Text(Load(without)));
        }
    }

    [Fact]
    public void The_schema_names_the_noise_field_components_that_there_are()
    {
        JsonNode words = _schema.Root["$defs"]!["array"]!["properties"]!["noiseField"]!["properties"]!["components"]!["items"]!["enum"]!;
        Assert.Equal(FieldComponents.Names.Order(), words.AsArray().Select(static w => w!.GetValue<string>()).Order());
    }

    [Fact]
    public void Every_key_has_a_description()
    {
        foreach (Place place in Places(_schema.Root, JsonNode.Parse(Full)!.AsObject(), []).Where(static p => p.Steps[^1] is string))
            Assert.False(string.IsNullOrWhiteSpace(place.Schema["description"]?.GetValue<string>()), place.Path);
    }

    private static string Text(ServiceConfiguration configuration) => string.Join('\n',
        [configuration.Broker.ToString(), configuration.Store.ToString(), $"{configuration.Influx}", $"{configuration.WebUrl}", configuration.Log.ToString(),
         .. configuration.Arrays.Select(static a => $"{a with { Geometry = null!, FieldComponents = [], LookDirections = [] }} {string.Join(';', a.Geometry.Channels)} {string.Join(';', a.FieldComponents)} {string.Join(';', a.LookDirections)}")]);

    private static ServiceConfiguration Load(JsonNode document) => ConfigurationFile.Parse(document.ToJsonString(), "/c/arraywatch.json", new Hashtable());

    private static IReadOnlyList<string> Errors(JsonNode document)
    {
        try
        {
            Load(document);
            return [];
        }
        catch (ConfigurationException exception)
        {
            return exception.Errors;
        }
    }

    /// <summary>Every place of the document, with its schema.</summary>
    private static IEnumerable<Place> Places(JsonObject given, JsonNode value, object[] steps)
    {
        JsonObject schema = _schema.Resolve(given);
        if (steps.Length > 0) yield return new(schema, steps);
        IEnumerable<(JsonObject, JsonNode?, object)> children = value switch
        {
            JsonObject o => o.Select(p => (schema["properties"]![p.Key]!.AsObject(), p.Value, (object)p.Key)),
            JsonArray list => list.Select((v, i) => (schema["items"]!.AsObject(), v, (object)i)),
            _ => [],
        };
        foreach ((JsonObject childSchema, JsonNode? child, object step) in children)
        {
            foreach (Place place in Places(childSchema, child!, [.. steps, step])) yield return place;
        }
    }

    private sealed record Place(JsonObject Schema, object[] Steps)
    {
        public string Path => string.Concat(Steps.Select(static s => s is int i ? $"[{i}]" : $".{s}")).TrimStart('.');

        /// <summary>A position is refused as a whole, all other numbers by themselves.</summary>
        public string ListPath => Steps[^1] is int ? Path[..Path.LastIndexOf('[')] : Path;

        public JsonNode With(JsonNode value)
        {
            JsonNode document = JsonNode.Parse(Full)!, parent = Parent(document);
            if (Steps[^1] is int index) parent[index] = value;
            else parent[(string)Steps[^1]] = value;
            return document;
        }

        public JsonNode Without()
        {
            JsonNode document = JsonNode.Parse(Full)!;
            if (Steps[^1] is string key) Parent(document).AsObject().Remove(key);
            return document;
        }

        private JsonNode Parent(JsonNode document) =>
            Steps[..^1].Aggregate(document, static (node, step) => step is int i ? node[i]! : node[(string)step]!);
    }
}
