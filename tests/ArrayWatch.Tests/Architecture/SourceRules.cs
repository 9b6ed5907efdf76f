using System.Text.RegularExpressions;

namespace ArrayWatch.Tests.Architecture;

/// <summary>What a source file may look like. Pure functions over its text, so that a planted offender can prove that they bite.</summary>
internal static partial class SourceRules
{
    /// <summary>A file over this holds a second concept.</summary>
    public const int MostLines = 400;

    /// <summary>Small records may share a file with the type that they serve.</summary>
    private const int MostPublicTypes = 8;

    /// <summary>What is wrong with a file.</summary>
    public static IReadOnlyList<string> Offences(string path, string text)
    {
        List<string> offences = [];
        int lines = text.Count(static c => c == '\n');
        if (lines > MostLines) offences.Add($"{path} has {lines} lines; {MostLines} are allowed");
        if (!path.EndsWith(".cs", StringComparison.Ordinal)) return offences;
        string[] types = [.. PublicType().Matches(text).Select(static m => m.Groups[1].Value)];
        if (types.Length > MostPublicTypes) offences.Add($"{path} has {types.Length} public types; give each a file of its own");
        if (types.Length > 1 && !types.Contains(Stem(path)) && !IsFamily(path)) offences.Add($"{path} has {types.Length} public types and none is called as the file");
        if (Region().IsMatch(text)) offences.Add($"{path} folds code away");
        if (Unfinished().IsMatch(text)) offences.Add($"{path} holds unfinished work");
        return offences;
    }

    private static string Stem(string path) => Path.GetFileName(path).Split('.')[0];

    /// <summary>Ports' files are called after the port's interface or the family of outputs.</summary>
    private static bool IsFamily(string path) => path.Contains("/Ports/", StringComparison.Ordinal);

    [GeneratedRegex(@"^public (?:(?:sealed|static|abstract|readonly|partial|ref) )*(?:record struct|record class|class|record|struct|interface|enum) (\w+)", RegexOptions.Multiline)]
    private static partial Regex PublicType();

    [GeneratedRegex(@"^\s*#" + "region", RegexOptions.Multiline)]
    private static partial Regex Region();

    [GeneratedRegex("\\b(?:TO" + "DO|FIX" + "ME|NotImplemented" + "Exception)\\b")]
    private static partial Regex Unfinished();
}
