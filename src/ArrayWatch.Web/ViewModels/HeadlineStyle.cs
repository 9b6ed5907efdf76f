namespace ArrayWatch.Web.ViewModels;

/// <summary>Names of the headline tones in style sheets.</summary>
internal static class HeadlineStyle
{
    public static string Of(HeadlineTone tone) => tone switch
    {
        HeadlineTone.Good => "good",
        HeadlineTone.Attention => "attention",
        HeadlineTone.Fault => "fault",
        _ => "no-data",
    };
}
