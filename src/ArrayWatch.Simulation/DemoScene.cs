namespace ArrayWatch.Simulation;

/// <summary>A scene to show, with what a configuration would say of its array.</summary>
/// <param name="Id">Id in topics and addresses.</param>
/// <param name="Title">What people would call the array.</param>
/// <param name="Scene">The scene; its start time is 0 and may be replaced.</param>
/// <param name="TimeConstant">Memory that suits its snapshot rate.</param>
/// <param name="FieldComponents">Names of the noise-field components that suit it.</param>
public sealed record DemoScene(
    string Id, string Title, Scene Scene, TimeSpan TimeConstant, IReadOnlyList<string> FieldComponents);
