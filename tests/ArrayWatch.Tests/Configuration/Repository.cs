namespace ArrayWatch.Tests.Configuration;

/// <summary>Finds files of the repository from wherever the tests run.</summary>
internal static class Repository
{
    /// <summary>The folder that holds the solution.</summary>
    public static string Root { get; } = Find();

    /// <summary>Absolute path of a file of the repository.</summary>
    public static string PathOf(params string[] parts) => Path.Combine([Root, .. parts]);

    /// <summary>The example configurations.</summary>
    public static IEnumerable<string> Examples =>
        Directory.EnumerateFiles(PathOf("config"), "*.json").Where(static f => !f.EndsWith(".schema.json", StringComparison.Ordinal));

    private static string Find()
    {
        for (DirectoryInfo? folder = new(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "ArrayWatch.sln"))) return folder.FullName;
        }

        throw new DirectoryNotFoundException("The tests run from a build folder inside the repository.");
    }
}
