namespace ArrayWatch.NoiseField.Calibration;

/// <summary>What of the channels' phases is set to zero because the field cannot show it, or hardly.</summary>
public enum PhaseGauge
{
    /// <summary>The mean phase: no noise field shows it.</summary>
    Constant,

    /// <summary>The mean, and what is linear in position: that only turns the field, and is nearly invisible in many.</summary>
    ConstantAndLinear,
}
