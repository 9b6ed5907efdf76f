using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Components;

/// <summary>What a person can do to an alert, with who and why.</summary>
public sealed partial class AlertActions : ComponentBase
{
    private readonly ActionForm _form = new();
    private AlertVerb? _open;
    private string? _error;
    private bool _busy;

    /// <summary>The alert.</summary>
    [Parameter, EditorRequired]
    public AlertEvent Alert { get; set; } = null!;

    [Inject]
    internal IFleet Fleet { get; set; } = null!;

    [Inject]
    internal TimeProvider Time { get; set; } = null!;

    [Inject]
    internal Watchkeeper Watchkeeper { get; set; } = null!;

    private bool IsOut => Alert.State == AlertState.OutOfService;

    private string Intent => _open switch
    {
        AlertVerb.Shelve => "Shelve",
        AlertVerb.Unshelve => "Unshelve",
        AlertVerb.OutOfService => IsOut ? "Bring back to service" : "Take out of service",
        _ => "Acknowledge",
    };

    private void Begin(AlertVerb verb)
    {
        _open = verb;
        _error = null;
        _form.Who = Watchkeeper.Name;
        _form.Why = "";
        _form.Hours = verb == AlertVerb.OutOfService ? 0 : 4;
    }

    private void Cancel() => _open = null;

    private async Task SubmitAsync()
    {
        if (_open is not { } verb) return;
        if (string.IsNullOrWhiteSpace(_form.Who))
        {
            _error = "Say who you are: it goes into the audit log.";
            return;
        }
        Watchkeeper.Name = _form.Who.Trim();
        bool hasEnd = verb == AlertVerb.Shelve || (verb == AlertVerb.OutOfService && !IsOut && _form.Hours > 0);

        // A minute less keeps "1 week" within the longest time that the service allows.
        DateTimeOffset? until = hasEnd ? Time.GetUtcNow().AddHours(_form.Hours).AddMinutes(_form.Hours == 168 ? -1 : 0) : null;
        _busy = true;
        try
        {
            AlertEvent? after = await Fleet.ActAsync(new AlertAction(Alert.Id, verb, Watchkeeper.Name, (_form.Why ?? "").Trim(), until), CancellationToken.None);
            _error = after is null ? "This alert is no longer open." : null;
            _open = null;
        }
        catch (InvalidOperationException e)
        {
            _error = $"Not possible: {e.Message}";
        }
        finally
        {
            _busy = false;
        }
    }

    private sealed class ActionForm
    {
        public string? Who { get; set; }

        public string? Why { get; set; }

        public int Hours { get; set; }
    }
}
