using System.Collections;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace ArrayWatch.Configuration;

/// <summary>Reads a configuration file, lays the environment over it and binds it.</summary>
internal static class ConfigurationFile
{
    private static readonly JsonDocumentOptions _strict = new() { AllowDuplicateProperties = false };
    private static readonly JsonDocumentOptions _lenient = new() { CommentHandling = JsonCommentHandling.Skip, AllowTrailingCommas = true };

    /// <summary>Reads a file.</summary>
    /// <param name="file">Its path. Relative paths inside it start from its folder.</param>
    /// <param name="environment">The process's variables.</param>
    /// <exception cref="IOException">The file cannot be read.</exception>
    /// <exception cref="UnauthorizedAccessException">The file may not be read.</exception>
    /// <exception cref="ConfigurationException">What it says cannot be used; every cause at once.</exception>
    public static ServiceConfiguration Load(string file, IDictionary environment) =>
        Parse(File.ReadAllText(file), Path.GetFullPath(file), environment);

    /// <summary>Reads a text.</summary>
    /// <param name="text">The JSON document.</param>
    /// <param name="file">Absolute path of the file that it is from.</param>
    /// <param name="environment">The process's variables.</param>
    /// <exception cref="ConfigurationException">What it says cannot be used; every cause at once.</exception>
    public static ServiceConfiguration Parse(string text, string file, IDictionary environment)
    {
        ConfigurationReport report = new();
        if (Document(text, file, report) is not { } document) throw new ConfigurationException(report.Errors);
        EnvironmentOverrides overrides = new(environment);
        overrides.Apply(document, report);
        ServiceConfiguration configuration = new ServiceReader(Path.GetDirectoryName(file)!).Read(new Section(document, "", overrides, report));
        return report.Errors.Count == 0 ? configuration : throw new ConfigurationException(report.Errors);
    }

    private static JsonObject? Document(string text, string file, ConfigurationReport report)
    {
        try
        {
            if (JsonNode.Parse(text, documentOptions: _strict) is JsonObject document) return document;
            report.Add(Path.GetFileName(file), "the configuration must be one JSON object { … }");
        }
        catch (JsonException exception)
        {
            string where = exception.LineNumber is { } line
                ? $"{Path.GetFileName(file)}, line {line + 1}, position {exception.BytePositionInLine + 1}"
                : Path.GetFileName(file);
            report.Add(where, IsOtherwiseGood(text)
                ? "JSON has no comments and no comma after the last element; remove it"
                : $"not JSON: {FirstSentence(exception.Message)}");
        }

        return null;
    }

    private static bool IsOtherwiseGood(string text)
    {
        try
        {
            using JsonDocument document = JsonDocument.Parse(text, _lenient with { AllowDuplicateProperties = false });
            return true;
        }
        catch (JsonException)
        {
            return false;
        }
    }

    private static string FirstSentence(string message)
    {
        int end = message.IndexOf(" Path: ", StringComparison.Ordinal);
        if (end < 0) end = message.IndexOf(" LineNumber: ", StringComparison.Ordinal);
        return (end < 0 ? message : message[..end]).TrimEnd();
    }
}
