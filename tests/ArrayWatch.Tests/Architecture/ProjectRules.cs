using System.Xml.Linq;

namespace ArrayWatch.Tests.Architecture;

/// <summary>What projects may refer to. Pure functions over project files, so that a planted offender can prove that they bite.</summary>
internal static class ProjectRules
{
    private static readonly Dictionary<string, string[]> _allowedProjects = new()
    {
        ["ArrayWatch.Signals"] = [],
        ["ArrayWatch.NoiseField"] = ["ArrayWatch.Signals"],
        ["ArrayWatch.Detection"] = ["ArrayWatch.NoiseField"],
        ["ArrayWatch.Simulation"] = ["ArrayWatch.NoiseField"],
        ["ArrayWatch.Monitoring"] = ["ArrayWatch.Detection"],
        ["ArrayWatch.Messaging"] = ["ArrayWatch.Monitoring"],
        ["ArrayWatch.Storage"] = ["ArrayWatch.Monitoring"],
        ["ArrayWatch.Web"] = ["ArrayWatch.Monitoring"],
        ["ArrayWatch"] = ["ArrayWatch.Messaging", "ArrayWatch.Storage", "ArrayWatch.Web", "ArrayWatch.Simulation"],
    };

    /// <summary>Packages that pure projects may use: mathematics, and analyzers that leave nothing in the result.</summary>
    private static readonly string[] _purePackages = ["MathNet.Numerics", "Microsoft.CodeAnalysis.BannedApiAnalyzers"];

    private static readonly string[] _pureProjects = ["ArrayWatch.Signals", "ArrayWatch.NoiseField", "ArrayWatch.Detection", "ArrayWatch.Simulation"];

    /// <summary>What a project refers to without being allowed to.</summary>
    public static IReadOnlyList<string> Offences(string name, string projectFile)
    {
        XDocument project = XDocument.Parse(projectFile);
        if (!_allowedProjects.TryGetValue(name, out string[]? allowed)) return [$"{name} is not in the list of projects"];
        List<string> offences = [.. Includes(project, "ProjectReference").Select(static p => Path.GetFileNameWithoutExtension(p.Replace('\\', '/'))).Except(allowed).Select(p => $"{name} refers to the project {p}")];
        if (_pureProjects.Contains(name))
        {
            offences.AddRange(Includes(project, "PackageReference").Except(_purePackages).Select(p => $"{name} is pure and refers to the package {p}"));
            offences.AddRange(Includes(project, "FrameworkReference").Select(p => $"{name} is pure and refers to the framework {p}"));
        }

        return offences;
    }

    private static IEnumerable<string> Includes(XDocument project, string element) =>
        project.Descendants(element).Select(static e => e.Attribute("Include")?.Value).OfType<string>();
}
