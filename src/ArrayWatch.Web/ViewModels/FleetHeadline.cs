using System.Globalization;

namespace ArrayWatch.Web.ViewModels;

/// <summary>The headline over all arrays.</summary>
internal static class FleetHeadline
{
    /// <summary>Puts the most urgent first; an array by name when it alone is concerned.</summary>
    /// <param name="arrays">Each array's id and headline.</param>
    public static Headline Of(IReadOnlyList<(string Id, Headline Headline)> arrays)
    {
        if (arrays.Count == 0) return new(HeadlineTone.NoData, "No array is configured", "Add one to the configuration and start the service again.");
        (string Id, Headline Headline)[] faulty = In(HeadlineTone.Fault), silent = In(HeadlineTone.NoData), attention = In(HeadlineTone.Attention);
        List<string> rest = [];
        Add(silent, faulty.Length > 0, "without data or judgement");
        Add(attention, faulty.Length > 0 || silent.Length > 0, "to look at");
        string detail = rest.Count == 0 ? "" : "Also " + string.Join(", and ", rest) + ".";
        return faulty.Length > 0 ? new(HeadlineTone.Fault, Some(faulty, "with faults"), detail)
            : silent.Length > 0 ? new(HeadlineTone.NoData, Some(silent, "without data or judgement"), detail)
            : attention.Length > 0 ? new(HeadlineTone.Attention, Some(attention, "to look at"), detail)
            : new(HeadlineTone.Good, arrays.Count == 1 ? $"{arrays[0].Id}: {arrays[0].Headline.Text}" : string.Create(CultureInfo.InvariantCulture, $"All {arrays.Count} arrays in order"), "");

        (string Id, Headline Headline)[] In(HeadlineTone tone) => [.. arrays.Where(a => a.Headline.Tone == tone)];

        string Some((string Id, Headline Headline)[] some, string what) => some.Length == 1
            ? $"{some[0].Id}: {some[0].Headline.Text}"
            : string.Create(CultureInfo.InvariantCulture, $"{some.Length} of {arrays.Count} arrays {what}: {string.Join(", ", some.Select(static a => a.Id))}");

        void Add((string Id, Headline Headline)[] some, bool isRest, string what)
        {
            if (isRest && some.Length > 0) rest.Add(string.Join(", ", some.Select(static a => a.Id)) + " " + what);
        }
    }
}
