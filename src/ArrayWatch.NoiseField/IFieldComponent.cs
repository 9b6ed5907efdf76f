namespace ArrayWatch.NoiseField;

/// <summary>
/// A kind of noise that the field may hold: it lists the covariances of unit power whose non-negative
/// mixture it is. A new kind is one class and one line in <see cref="FieldComponents"/>.
/// </summary>
public interface IFieldComponent
{
    /// <summary>Name in the configuration and in reports.</summary>
    string Name { get; }

    /// <summary>Adds this component's atoms for one bin.</summary>
    void Describe(FieldContext context, FieldAtoms atoms);
}
