using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Pages;

/// <summary>What a beamformer should apply to one array now, and what that brings.</summary>
public partial class CorrectionsPage : LiveComponent
{
    private CorrectionReport? _report;
    private IReadOnlyList<CorrectionRow> _rows = [];
    private IReadOnlyList<BeamRow> _beams = [];

    /// <summary>Id of the array.</summary>
    [Parameter]
    public string Id { get; set; } = "";

    /// <inheritdoc/>
    protected override Task LoadAsync()
    {
        _report = Fleet.Corrections(Id);
        _rows = _report is null ? [] : CorrectionRow.Of(_report);
        _beams = _report is null ? [] : BeamRow.Of(_report.Beams);
        return Task.CompletedTask;
    }
}
