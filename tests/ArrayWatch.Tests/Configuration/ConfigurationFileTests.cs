using System.Collections;
using ArrayWatch.Configuration;
using ArrayWatch.Messaging;
using ArrayWatch.Monitoring;

namespace ArrayWatch.Tests.Configuration;

public sealed class ConfigurationFileTests
{
    private const string Array = """{ "id": "aft", "medium": { "soundSpeed": 1500 }, "line": { "count": 4, "spacing": 1 } }""";
    private const string Least = $$"""{ "arrays": [ {{Array}} ] }""";

    [Fact]
    public void What_is_left_out_takes_its_default()
    {
        ServiceConfiguration configuration = Load(Least);
        Assert.Equal(new MqttOptions(), configuration.Broker);
        Assert.Equal("/c/data/arraywatch.db", configuration.Store.Path);
        Assert.Null(configuration.Influx);
        Assert.Null(configuration.WebUrl);
        ArrayDefinition array = Assert.Single(configuration.Arrays);
        Assert.Equal(["broadside", "endfire 1", "endfire 4"], array.LookDirections.Select(d => d.Name));
        Assert.Equal([90, 180, 0], array.LookDirections.Select(d => d.AzimuthDegrees));
    }

    [Fact]
    public void A_planar_array_is_looked_at_from_four_azimuths()
    {
        ServiceConfiguration configuration = Load("""
            { "arrays": [ { "id": "p", "medium": { "air": { "temperature": 15 } }, "channels": [
              { "label": "1", "position": [0, 0, 0] }, { "label": "2", "position": [1, 0, 0] }, { "label": "3", "position": [0, 1, 0] } ] } ] }
            """);
        Assert.Equal([0, 90, 180, 270], configuration.Arrays[0].LookDirections.Select(d => d.AzimuthDegrees));
    }

    [Fact]
    public void A_vertical_line_is_looked_at_from_above_and_below()
    {
        ServiceConfiguration configuration = Load("""
            { "arrays": [ { "id": "v", "medium": { "soundSpeed": 1500 }, "line": { "count": 4, "spacing": 1, "axis": [0, 0, -2] } } ] }
            """);
        Assert.Equal([0, 90, -90], configuration.Arrays[0].LookDirections.Select(d => d.ElevationDegrees));
    }

    [Fact]
    public void Relative_paths_start_from_the_folder_of_the_file()
    {
        ServiceConfiguration configuration = Load($$"""{ "store": { "path": "x/y.db" }, "log": { "folder": "/var/log/a" }, "arrays": [ {{Array}} ] }""");
        Assert.Equal("/c/x/y.db", configuration.Store.Path);
        Assert.Equal("/var/log/a", configuration.Log.Folder);
    }

    [Fact]
    public void An_unknown_key_is_named_with_the_nearest_known_one()
    {
        Assert.Equal(["brokr: is no known key; the nearest known one is 'broker'"], Errors($$"""{ "brokr": {}, "arrays": [ {{Array}} ] }"""));
        Assert.Equal(["broker.Prot: is no known key; the nearest known one is 'port'"], Errors($$"""{ "broker": { "Prot": 1 }, "arrays": [ {{Array}} ] }"""));
    }

    [Fact]
    public void Every_error_comes_out_at_once_and_in_one_line()
    {
        IReadOnlyList<string> errors = Errors("""
            { "broker": { "port": 0, "topicPrefix": "a/#" }, "web": { "url": "https://x:1" }, "store": { "retentionDays": 1.5 },
              "arrays": [ { "id": "a b", "medium": {}, "line": { "count": 1 } }, { "id": "x", "medium": { "soundSpeed": "fast" } } ] }
            """);
        Assert.Equal(
        [
            "broker.port: 0 is not allowed; give a whole number: a port from 1 to 65535",
            "broker.topicPrefix: \"a/#\" is not allowed; give a topic without + and #, and without / at its ends",
            "store.retentionDays: 1.5 is not allowed; give a whole number: days from 1 to 36500",
            "web.url: \"https://x:1\" is not allowed; give http://, an address or a name, and a port, as in http://127.0.0.1:8080",
            "arrays[0].id: \"a b\" is not allowed; give 1 to 64 letters, digits, '-', '_' or '.', other than 'service'",
            "arrays[0].medium: gives nothing; give exactly one of soundSpeed, seaWater, air",
            "arrays[0].line.count: 1 is not allowed; give a whole number: channels from 2 to 4096",
            "arrays[0].line.spacing: is missing; give metres from 0.0001 to 100000",
            "arrays[1].medium.soundSpeed: \"fast\" is not allowed; give m/s from 100 to 15000",
            "arrays[1]: has no channels; give line or channels",
        ], errors);
        Assert.All(errors, e => Assert.DoesNotContain('\n', e));
    }

    [Theory]
    [InlineData("service")]
    [InlineData("a/b")]
    [InlineData("a+b")]
    [InlineData("#")]
    [InlineData("")]
    [InlineData("..")]
    public void An_id_that_cannot_stand_in_a_topic_is_refused(string id) =>
        Assert.Contains(Errors($$"""{ "arrays": [ { "id": "{{id}}", "medium": { "soundSpeed": 1500 }, "line": { "count": 4, "spacing": 1 } } ] }"""), e => e.StartsWith("arrays[0].id:", StringComparison.Ordinal));

    [Fact]
    public void Ids_labels_and_names_that_stand_twice_are_refused()
    {
        IReadOnlyList<string> errors = Errors($$"""
            { "arrays": [ {{Array}}, {{Array}}, { "id": "p", "medium": { "soundSpeed": 340 },
              "channels": [ { "label": "1", "position": [0, 0, 0] }, { "label": "1", "position": [1, 0, 0] } ],
              "lookDirections": [ { "name": "n", "azimuth": 0 }, { "name": "n", "azimuth": 9 } ] } ] }
            """);
        Assert.Contains("arrays[1].id: 'aft' is another array's id too; each needs its own", errors);
        Assert.Contains("arrays[2].channels[1].label: '1' is another channel's label too; each needs its own", errors);
        Assert.Contains("arrays[2].lookDirections[1].name: 'n' is another direction's name too; each needs its own", errors);
    }

    [Fact]
    public void A_secret_in_the_file_is_refused_and_from_the_environment_taken()
    {
        string error = Assert.Single(Errors($$"""{ "broker": { "password": "p" }, "arrays": [ {{Array}} ] }"""));
        Assert.Contains("ARRAYWATCH__broker__password", error, StringComparison.Ordinal);
        Assert.DoesNotContain("\"p\"", error, StringComparison.Ordinal);
        Assert.Equal("p", Load(Least, ("ARRAYWATCH__broker__password", "p")).Broker.Password);
    }

    [Fact]
    public void The_environment_overrides_any_value_by_its_path()
    {
        ServiceConfiguration configuration = Load(Least,
            ("ARRAYWATCH__broker__port", "1884"), ("ARRAYWATCH__BROKER__TLS", "true"), ("ARRAYWATCH__arrays__0__id", "bow"),
            ("ARRAYWATCH__arrays__0__line__axis", "[0, 1, 0]"), ("ARRAYWATCH__arrays__0__medium__soundSpeed", "1490.5"),
            ("ARRAYWATCH__arrays__1__id", "new"), ("ARRAYWATCH__arrays__1__medium__soundSpeed", "340"),
            ("ARRAYWATCH__arrays__1__line__count", "8"), ("ARRAYWATCH__arrays__1__line__spacing", "0.1"));
        Assert.Equal(1884, configuration.Broker.Port);
        Assert.True(configuration.Broker.UseTls);
        Assert.Equal(["bow", "new"], configuration.Arrays.Select(a => a.Id));
        Assert.Equal(new Medium.Given(1490.5), configuration.Arrays[0].Medium);
        Assert.Equal(3, configuration.Arrays[0].Geometry[3].Y);
        Assert.Equal(8, configuration.Arrays[1].Geometry.Count);
    }

    [Fact]
    public void An_error_says_which_variable_it_came_from()
    {
        Assert.Equal(["broker.port (from ARRAYWATCH__broker__port): \"x\" is not allowed; give a whole number: a port from 1 to 65535"], Errors(Least, ("ARRAYWATCH__broker__port", "x")));
        Assert.Equal(["broker.prot (from ARRAYWATCH__broker__prot): is no known key; the nearest known one is 'port'"], Errors(Least, ("ARRAYWATCH__broker__prot", "1")));
        Assert.StartsWith("ARRAYWATCH__arrays__7__id: leads to no place", Assert.Single(Errors(Least, ("ARRAYWATCH__arrays__7__id", "x"))), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("{ \"arrays\": [ 1, ] }", "arraywatch.json, line 1, position 18: JSON has no comments and no comma after the last element; remove it")]
    [InlineData("{\n // note\n \"arrays\": [] }", "arraywatch.json, line 2, position 2: JSON has no comments and no comma after the last element; remove it")]
    [InlineData("[]", "arraywatch.json: the configuration must be one JSON object { … }")]
    public void What_is_not_json_is_said_with_its_place(string text, string error) => Assert.Equal([error], Errors(text));

    [Theory]
    [InlineData("")]
    [InlineData("{ \"arrays\": [ }")]
    [InlineData("{ \"store\": {}, \"store\": {} }")]
    public void Broken_text_gives_one_line(string text) => Assert.DoesNotContain('\n', Assert.Single(Errors(text)));

    [Fact]
    public void A_water_that_the_equations_do_not_cover_is_refused() =>
        Assert.StartsWith("arrays[0].medium.seaWater:", Assert.Single(Errors("""
            { "arrays": [ { "id": "a", "medium": { "seaWater": { "temperature": -1, "salinity": 5 } }, "line": { "count": 4, "spacing": 1 } } ] }
            """)), StringComparison.Ordinal);

    private static ServiceConfiguration Load(string text, params (string, string)[] variables)
    {
        Hashtable environment = [];
        foreach ((string name, string value) in variables) environment[name] = value;
        return ConfigurationFile.Parse(text, "/c/arraywatch.json", environment);
    }

    private static IReadOnlyList<string> Errors(string text, params (string, string)[] variables) =>
        Assert.Throws<ConfigurationException>(() => Load(text, variables)).Errors;
}
