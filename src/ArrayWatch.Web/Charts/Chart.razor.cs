using Microsoft.AspNetCore.Components;
using Plotly.Blazor;

namespace ArrayWatch.Web.Charts;

/// <summary>Draws a <see cref="ChartSpec"/>, and draws it again when another one is given.</summary>
public partial class Chart : ComponentBase
{
    private readonly Config _config = ChartTraces.Config();
    private PlotlyChart? _chart;
    private ChartSpec? _drawn;
    private IList<ITrace> _data = [];
    private Layout _layout = new();

    [Parameter, EditorRequired]
    public ChartSpec? Spec { get; set; }

    /// <inheritdoc/>
    protected override void OnParametersSet()
    {
        if (Spec is not { } spec || ReferenceEquals(spec, _drawn)) return;
        _data = ChartTraces.Traces(spec);
        _layout = ChartTraces.Layout(spec);
    }

    /// <inheritdoc/>
    protected override async Task OnAfterRenderAsync(bool firstRender)
    {
        if (Spec is not { } spec || ReferenceEquals(spec, _drawn) || _chart is null) return;
        bool again = _drawn is not null;
        _drawn = spec;
        if (!again) return;
        await _chart.React();
    }
}
