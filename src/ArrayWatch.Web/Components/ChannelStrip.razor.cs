using ArrayWatch.Detection;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Components;

/// <summary>All channels of an array in a row, in the order of their indices, each by its standing.</summary>
public partial class ChannelStrip : ComponentBase
{
    private IReadOnlyList<Standing> _standings = [];
    private string _summary = "";

    /// <summary>Each channel's standing; a missing one is unknown.</summary>
    [Parameter, EditorRequired]
    public IReadOnlyList<Standing> Standings { get; set; } = [];

    /// <summary>Each channel's label.</summary>
    [Parameter, EditorRequired]
    public IReadOnlyList<string> Labels { get; set; } = [];

    /// <summary>True when data have stopped: what is drawn is no longer so, and looks it.</summary>
    [Parameter]
    public bool IsOld { get; set; }

    /// <inheritdoc/>
    protected override void OnParametersSet()
    {
        _standings = [.. Enumerable.Range(0, Labels.Count).Select(i => i < Standings.Count ? Standings[i] : Standing.Unknown)];
        _summary = "Channels from first to last: " + string.Join(", ", StandingWords.MostUrgentFirst
            .Select(s => (Standing: s, Who: Enumerable.Range(0, Labels.Count).Where(i => _standings[i] == s).Select(i => Labels[i]).ToArray()))
            .Where(static p => p.Who.Length > 0)
            .Select(static p => p.Who.Length <= 6
                ? $"{StandingWords.Word(p.Standing)} {string.Join(" ", p.Who)}"
                : FormattableString.Invariant($"{p.Who.Length} {StandingWords.Word(p.Standing)}")));
    }
}
