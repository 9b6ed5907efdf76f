namespace ArrayWatch.Web.Live;

/// <summary>Who last acted in this circuit, so that nobody types a name twice in a watch.</summary>
internal sealed class Watchkeeper
{
    public string Name { get; set; } = "";
}
