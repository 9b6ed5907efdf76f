using System.Reflection;
using ArrayWatch.Tests.Configuration;

namespace ArrayWatch.Tests.Architecture;

public sealed class ArchitectureTests
{
    private static readonly string[] _pure = ["ArrayWatch.Signals", "ArrayWatch.NoiseField", "ArrayWatch.Detection", "ArrayWatch.Simulation"];

    /// <summary>Parts of the runtime by which a program reaches files, networks, processes, logs or hosts.</summary>
    private static readonly string[] _outside =
        ["System.IO.FileSystem", "System.IO.Pipes", "System.Net", "System.Diagnostics.Process", "System.Console", "Microsoft.Extensions", "Microsoft.AspNetCore", "MQTTnet", "Microsoft.Data", "Serilog"];

    [Fact]
    public void Projects_refer_only_to_what_lies_further_in()
    {
        string[] projects = [.. Directory.EnumerateFiles(Repository.PathOf("src"), "*.csproj", SearchOption.AllDirectories)];
        Assert.Equal(9, projects.Length);
        Assert.Empty(projects.SelectMany(static p => ProjectRules.Offences(Path.GetFileNameWithoutExtension(p), File.ReadAllText(p))));
    }

    [Theory]
    [InlineData("ArrayWatch.Signals", "<ProjectReference Include=\"..\\ArrayWatch.Detection\\ArrayWatch.Detection.csproj\" />")]
    [InlineData("ArrayWatch.Web", "<ProjectReference Include=\"../ArrayWatch.Storage/ArrayWatch.Storage.csproj\" />")]
    [InlineData("ArrayWatch.Monitoring", "<ProjectReference Include=\"../ArrayWatch.Simulation/ArrayWatch.Simulation.csproj\" />")]
    [InlineData("ArrayWatch.Detection", "<PackageReference Include=\"MQTTnet\" />")]
    [InlineData("ArrayWatch.NoiseField", "<FrameworkReference Include=\"Microsoft.AspNetCore.App\" />")]
    [InlineData("ArrayWatch.Unheard", "")]
    public void The_project_rule_catches_a_planted_offender(string name, string reference) =>
        Assert.NotEmpty(ProjectRules.Offences(name, $"<Project><ItemGroup>{reference}</ItemGroup></Project>"));

    [Fact]
    public void Files_are_short_and_hold_one_concept() =>
        Assert.Empty(Sources().SelectMany(static f => SourceRules.Offences(Path.GetRelativePath(Repository.Root, f).Replace('\\', '/'), File.ReadAllText(f))));

    [Fact]
    public void The_source_rule_catches_planted_offenders()
    {
        Assert.NotEmpty(SourceRules.Offences("src/A.cs", new string('\n', SourceRules.MostLines + 1)));
        Assert.NotEmpty(SourceRules.Offences("src/A.razor", new string('\n', SourceRules.MostLines + 1)));
        Assert.NotEmpty(SourceRules.Offences("src/A.cs", "public sealed class B;\npublic record C;\n"));
        Assert.NotEmpty(SourceRules.Offences("src/A.cs", string.Concat(Enumerable.Range(0, 9).Select(static i => $"public enum {(i == 0 ? "A" : $"E{i}")} {{ }}\n"))));
        Assert.NotEmpty(SourceRules.Offences("src/A.cs", "    #" + "region x\n"));
        Assert.NotEmpty(SourceRules.Offences("src/A.cs", "// TO" + "DO later\n"));
        Assert.Empty(SourceRules.Offences("src/A.cs", "public sealed class A;\npublic record C;\n"));
    }

    [Fact]
    public void Pure_assemblies_reach_nothing_outside() => Assert.Empty(_pure.SelectMany(static name => Reached(Assembly.Load(name))));

    [Fact]
    public void The_purity_rule_catches_a_planted_offender() => Assert.NotEmpty(Reached(typeof(ArrayWatch.Commands.ExitCode).Assembly));

    [Fact]
    public void Pure_projects_ban_the_clock_and_the_disk_at_build_time()
    {
        string props = File.ReadAllText(Repository.PathOf("Directory.Build.props")), banned = File.ReadAllText(Repository.PathOf("src", "BannedSymbols.txt"));
        Assert.All(_pure, name => Assert.Contains($"'{name}'", props, StringComparison.Ordinal));
        Assert.All((string[])["System.DateTime.UtcNow", "System.IO.File", "System.Environment", "System.Random.Shared"], symbol => Assert.Contains($":{symbol};", banned, StringComparison.Ordinal));
    }

    [Fact]
    public void No_test_is_put_aside_or_waits_for_a_fixed_time()
    {
        string[] forbidden = ["Skip " + "= \"", "Thread." + "Sleep", "Task." + "Delay("];
        string[] offenders = [.. Directory.EnumerateFiles(Repository.PathOf("tests"), "*.cs", SearchOption.AllDirectories)
            .Where(IsSource).Where(f => forbidden.Any(word => File.ReadAllText(f).Contains(word, StringComparison.Ordinal)))];
        Assert.Empty(offenders);
    }

    private static IEnumerable<string> Reached(Assembly assembly) => assembly.GetReferencedAssemblies()
        .Select(static a => a.Name!).Where(static a => _outside.Any(o => a.StartsWith(o, StringComparison.Ordinal)))
        .Select(a => $"{assembly.GetName().Name} reaches {a}");

    private static IEnumerable<string> Sources() => ((string[])["*.cs", "*.razor"])
        .SelectMany(static pattern => Directory.EnumerateFiles(Repository.Root, pattern, SearchOption.AllDirectories)).Where(IsSource);

    private static bool IsSource(string file)
    {
        string[] parts = Path.GetRelativePath(Repository.Root, file).Split('/', '\\');
        return !parts.Contains("bin") && !parts.Contains("obj");
    }
}
