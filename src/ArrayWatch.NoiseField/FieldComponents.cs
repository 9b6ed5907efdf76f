using ArrayWatch.NoiseField.Components;

namespace ArrayWatch.NoiseField;

/// <summary>The noise-field components that a configuration can name.</summary>
public static class FieldComponents
{
    private static readonly IFieldComponent[] All =
    [
        new IsotropicComponent(),
        new PlaneWavesComponent(),
        new ChannelNoiseComponent(),
        new SurfaceNoiseComponent(),
    ];

    /// <summary>Names of all components.</summary>
    public static IReadOnlyList<string> Names { get; } = [.. All.Select(c => c.Name)];

    /// <summary>The components of these names.</summary>
    /// <param name="names">Names, each known, none twice.</param>
    /// <returns>One a name.</returns>
    /// <exception cref="ArgumentException">An unknown or repeated name; the message lists the known ones.</exception>
    public static IReadOnlyList<IFieldComponent> Find(IEnumerable<string> names)
    {
        ArgumentNullException.ThrowIfNull(names);
        List<IFieldComponent> found = [];
        foreach (string name in names)
        {
            IFieldComponent component = Array.Find(All, c => c.Name == name)
                ?? throw new ArgumentException($"no noise-field component is called '{name}'; known are {string.Join(", ", Names)}", nameof(names));
            if (found.Contains(component)) throw new ArgumentException($"the noise-field component '{name}' is named twice", nameof(names));
            found.Add(component);
        }

        return found;
    }
}
