using ArrayWatch.Detection;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>Something that is wrong now, under the key by which it is known again. Immutable.</summary>
/// <param name="Key">The same as long as it is the same fault.</param>
/// <param name="Finding">What is wrong.</param>
internal sealed record AlertCondition(string Key, Finding Finding)
{
    /// <summary>Kind of what is wrong with the stream itself.</summary>
    public const string StreamKind = "stream";

    /// <summary>The condition of a finding.</summary>
    public static AlertCondition Of(Finding finding) => new(KeyOf(finding.Kind, finding.Indices, finding.Cause), finding);

    /// <summary>
    /// A channel fault is known by kind and channels; a fault of the stream by its cause, whichever channels it
    /// has reached.
    /// </summary>
    public static string KeyOf(string kind, IReadOnlyList<int> indices, string? cause) =>
        kind == StreamKind ? $"{kind}:{cause}" : $"{kind}:{string.Join(',', indices)}";
}
