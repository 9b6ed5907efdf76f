using ArrayWatch.Signals;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>
/// One cause, one alert: when most channels of a module, connector or digitiser show one kind of fault, the module is at fault.
/// </summary>
internal static class GroupRule
{
    // Two channels of a pair may fail by chance; three of a group of three or more do not.
    private const int FewestChannels = 3;
    private const double LeastShare = 0.75;

    /// <summary>Replaces single-channel explanations of one kind in one group by one explanation of the group.</summary>
    public static IReadOnlyList<Candidate> Apply(IReadOnlyList<Candidate> candidates, ArrayGeometry geometry)
    {
        List<Candidate> result = [.. candidates];
        Dictionary<string, int> sizes = geometry.Channels.Where(c => c.Group is not null).GroupBy(c => c.Group!).ToDictionary(g => g.Key, g => g.Count());
        var together = candidates.Where(c => c.Indices.Count == 1 && geometry.Channels[c.Indices[0]].Group is not null)
            .GroupBy(c => (c.Kind, Group: geometry.Channels[c.Indices[0]].Group!));
        foreach (var members in together)
        {
            int count = members.Count();
            if (count < FewestChannels || count < LeastShare * sizes[members.Key.Group] || sizes[members.Key.Group] == geometry.Count) continue;
            foreach (Candidate c in members) result.Remove(c);
            result.Add(Join([.. members.OrderBy(c => c.Indices[0])], members.Key.Group));
        }

        return result;
    }

    private static Candidate Join(Candidate[] members, string group) => members[0] with
    {
        Indices = [.. members.Select(c => c.Indices[0])],
        Group = group,
        Identity = "group " + group,
        Nats = members.Min(c => c.Nats),
        Estimate = members[0].Estimate.ToDictionary(
            e => e.Key,
            e => e.Value is double ? members.Average(m => m.Estimate.TryGetValue(e.Key, out object? v) && v is double d ? d : double.NaN) : e.Value),
        Evidence = members[0].Evidence.Keys.ToDictionary(k => k, k => members.Average(m => m.Evidence.GetValueOrDefault(k))),
    };
}
