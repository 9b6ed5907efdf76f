namespace ArrayWatch.Configuration;

/// <summary>The configuration cannot be used.</summary>
/// <param name="errors">One line a cause; at least one.</param>
internal sealed class ConfigurationException(IReadOnlyList<string> errors) : Exception(string.Join(Environment.NewLine, errors))
{
    /// <summary>One line a cause.</summary>
    public IReadOnlyList<string> Errors { get; } = errors;
}
