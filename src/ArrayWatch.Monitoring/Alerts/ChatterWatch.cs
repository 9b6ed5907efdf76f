namespace ArrayWatch.Monitoring.Alerts;

/// <summary>
/// Tells an alarm that repeatedly comes and goes: three occurrences that cleared within the window ("chattering" in
/// IEC 62682, which gives no number; three within a minute is common practice, no source, and the window here is
/// as long as decisions make it). One caller at a time.
/// </summary>
internal sealed class ChatterWatch(double windowSeconds)
{
    internal const int Occurrences = 3;

    private readonly Dictionary<string, List<double>> _raised = new(StringComparer.Ordinal);

    /// <summary>Window, seconds.</summary>
    public double WindowSeconds => windowSeconds;

    /// <summary>Remembers that a fault came.</summary>
    public void Raised(string key, double timeSeconds)
    {
        if (!_raised.TryGetValue(key, out List<double>? times)) _raised[key] = times = [];
        times.Add(timeSeconds);
        Prune(key, timeSeconds);
    }

    /// <summary>Whether a fault that goes now has come and gone often enough within the window to be held.</summary>
    public bool Chatters(string key, double timeSeconds)
    {
        Prune(key, timeSeconds);
        return _raised.TryGetValue(key, out List<double>? times) && times.Count >= Occurrences;
    }

    /// <summary>Forgets faults that have been quiet for a window, and everything that lies in the future when event time starts again.</summary>
    public void Sweep(double timeSeconds)
    {
        foreach (string key in _raised.Keys.ToArray()) Prune(key, timeSeconds);
    }

    private void Prune(string key, double timeSeconds)
    {
        if (!_raised.TryGetValue(key, out List<double>? times)) return;
        times.RemoveAll(t => t < timeSeconds - windowSeconds || t > timeSeconds);
        if (times.Count == 0) _raised.Remove(key);
    }
}
