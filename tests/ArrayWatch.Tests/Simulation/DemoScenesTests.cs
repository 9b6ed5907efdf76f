using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;

namespace ArrayWatch.Tests.Simulation;

public sealed class DemoScenesTests
{
    [Fact]
    public void Every_demonstration_runs_and_shows_one_fault_at_a_time_from_half_a_minute_on()
    {
        foreach (DemoScene demo in DemoScenes.All())
        {
            SceneRunner runner = new(demo.Scene, new RandomNumbers(1));
            float[] data = new float[runner.FrameLength];
            runner.NextFrame(data);
            Assert.All(data, v => Assert.True(float.IsFinite(v)));
            Assert.Equal(30, demo.Scene.Faults.Min(f => f.StartSeconds));
            Fault[] ordered = [.. demo.Scene.Faults.OrderBy(f => f.StartSeconds)];
            foreach ((Fault earlier, Fault later) in ordered.Zip(ordered.Skip(1))) Assert.True(earlier.EndSeconds < later.StartSeconds);
            Assert.InRange(1 / demo.Scene.SnapshotIntervalSeconds, 10, 20);
        }
    }
}
