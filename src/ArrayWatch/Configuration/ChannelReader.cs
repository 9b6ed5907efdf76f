using ArrayWatch.Signals;

namespace ArrayWatch.Configuration;

/// <summary>Binds <c>channels</c>, for arrays that are no uniform line.</summary>
internal static class ChannelReader
{
    private const double FarthestMetres = 1e6;

    /// <summary>Reads the channels; null when they make no array, which is noted.</summary>
    public static ArrayGeometry? Read(Section array)
    {
        IReadOnlyList<Section> sections = array.Children("channels");
        Dictionary<string, int> labels = new(StringComparer.Ordinal);
        List<Channel> channels = [];
        foreach (Section section in sections)
        {
            string label = section.RequiredText("label", "what people call the channel");
            double[]? position = section.Triple("position", FarthestMetres, "metres");
            string? group = section.Text("group", null);
            section.Close();
            if (label.Length > 0 && !labels.TryAdd(label, labels.Count)) section.Fail("label", $"'{label}' is another channel's label too; each needs its own");
            else if (label.Length > 0 && position is not null) channels.Add(new(label, new(position[0], position[1], position[2]), group));
        }

        if (sections.Count is < 2 or > ArrayGeometry.MaximumChannels)
            array.Fail("channels", $"{sections.Count} channels are given; an array has 2 to {ArrayGeometry.MaximumChannels}");
        else if (channels.Count == sections.Count)
            return new(channels);
        return null;
    }
}
