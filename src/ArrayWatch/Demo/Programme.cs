using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;

namespace ArrayWatch.Demo;

/// <summary>What the show will bring, told at its start.</summary>
internal static class Programme
{
    private const int FaultsTold = 8;

    /// <summary>The lines.</summary>
    public static IEnumerable<string> Lines(IReadOnlyList<DemoScene> scenes, Uri web)
    {
        yield return "ArrayWatch demonstration: two invented arrays send snapshots over MQTT; one channel fault after another appears.";
        yield return "";
        foreach (DemoScene scene in scenes) yield return $"  {scene.Id,-7} {scene.Title}, {scene.Scene.Geometry.Count} channels";
        yield return "";
        yield return $"Pages:  {web}     (open it in a browser)";
        yield return "Ctrl-C ends the demonstration and removes what it stored.";
        yield return "";
        yield return "What will go wrong, and when (minutes:seconds from now; each lasts a minute):";
        foreach ((DemoScene scene, Fault fault) in scenes.SelectMany(static s => s.Scene.Faults.Select(f => (s, f))).OrderBy(static p => p.f.StartSeconds).Take(FaultsTold))
            yield return $"  {DemoClock.OfScene(fault.StartSeconds),5}  {scene.Id,-7} {fault.Kind} of {string.Join(", ", fault.Channels.Select(c => scene.Scene.Geometry.Channels[c].Label))}";
        yield return "  and so on. An alert follows each within seconds to half a minute:";
        yield return "";
    }
}
