namespace ArrayWatch.Configuration;

/// <summary>Collects what is wrong with a configuration, one line a cause, in the order of the file.</summary>
internal sealed class ConfigurationReport
{
    private readonly List<string> _errors = [];

    /// <summary>Every cause so far.</summary>
    public IReadOnlyList<string> Errors => _errors;

    /// <summary>Notes a cause: where, what was given, what is allowed, what to do.</summary>
    public void Add(string where, string what) => _errors.Add($"{where}: {what}");
}
