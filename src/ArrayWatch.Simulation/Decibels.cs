namespace ArrayWatch.Simulation;

/// <summary>Decibels to ratios and back.</summary>
public static class Decibels
{
    /// <summary>10^(L/10).</summary>
    public static double ToPower(double decibels) => Math.Pow(10, decibels / 10);

    /// <summary>10^(L/20).</summary>
    public static double ToAmplitude(double decibels) => Math.Pow(10, decibels / 20);

    /// <summary>10 lg of a power ratio.</summary>
    public static double FromPower(double power) => 10 * Math.Log10(power);
}
