using ArrayWatch.Detection;

namespace ArrayWatch.Web.ViewModels;

/// <summary>Word, style name and meaning of each standing of a channel.</summary>
internal static class StandingWords
{
    /// <summary>From what needs a person first to what needs none.</summary>
    public static IReadOnlyList<Standing> MostUrgentFirst { get; } =
        [Standing.Faulty, Standing.Suspect, Standing.Unknown, Standing.OutOfService, Standing.Trusted];

    public static string Word(Standing standing) => standing switch
    {
        Standing.Trusted => "trusted",
        Standing.Suspect => "suspect",
        Standing.Faulty => "faulty",
        Standing.OutOfService => "out of service",
        _ => "cannot tell",
    };

    /// <summary>Name in style sheets.</summary>
    public static string Style(Standing standing) => standing switch
    {
        Standing.Trusted => "trusted",
        Standing.Suspect => "suspect",
        Standing.Faulty => "faulty",
        Standing.OutOfService => "out",
        _ => "unknown",
    };

    public static string Meaning(Standing standing) => standing switch
    {
        Standing.Trusted => "Within tolerance, with confidence: use its data.",
        Standing.Suspect => "Looks beyond tolerance, but not yet with the confidence that an alert needs.",
        Standing.Faulty => "A fault is confirmed: see its alert before you use its data.",
        Standing.OutOfService => "A person took it out of use: neither trusted nor judged.",
        _ => "The data cannot tell: too few of them yet, or a noise field that shows nothing of this channel.",
    };
}
