namespace ArrayWatch.Signals.Kernels;

/// <summary>What a product does to what already stands in its destination.</summary>
internal enum ProductMode
{
    /// <summary>C ← A B.</summary>
    Set,

    /// <summary>C ← −A B.</summary>
    SetNegated,

    /// <summary>C ← C − A B.</summary>
    Subtract,
}
