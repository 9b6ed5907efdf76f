using ArrayWatch.Monitoring.Ports;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Live;

/// <summary>A part of a page that follows the fleet: it loads at first, at every change of the fleet, and draws once a second.</summary>
public abstract class LiveComponent : ComponentBase, IDisposable
{
    private readonly CancellationTokenSource _gone = new();
    private IDisposable? _subscription;
    private bool _disposed;

    [Inject]
    internal LiveTick Tick { get; set; } = null!;

    /// <summary>The live arrays.</summary>
    [Inject]
    internal IFleet Fleet { get; set; } = null!;

    /// <summary>Wall clock.</summary>
    protected DateTimeOffset Now => Tick.Now;

    /// <summary>Cancelled when the component goes away.</summary>
    protected CancellationToken Gone => _gone.Token;

    /// <summary>Reads what is shown. Called on the component's own context.</summary>
    protected virtual Task LoadAsync() => Task.CompletedTask;

    /// <inheritdoc/>
    protected override async Task OnParametersSetAsync() => await LoadAsync();

    /// <inheritdoc/>
    protected override void OnAfterRender(bool firstRender)
    {
        if (firstRender && !_disposed) _subscription = Tick.Listen(changed => InvokeAsync(() => OnTickAsync(changed)));
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        Dispose(true);
        GC.SuppressFinalize(this);
    }

    /// <summary>Stops following.</summary>
    protected virtual void Dispose(bool disposing)
    {
        if (!disposing || _disposed) return;
        _disposed = true;
        _subscription?.Dispose();
        _gone.Cancel();
        _gone.Dispose();
    }

    private async Task OnTickAsync(bool changed)
    {
        if (_disposed) return;
        if (changed) await LoadAsync();
        if (!_disposed) StateHasChanged();
    }
}
