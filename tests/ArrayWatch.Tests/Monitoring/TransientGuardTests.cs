using ArrayWatch.Monitoring.Estimation;

namespace ArrayWatch.Tests.Monitoring;

/// <summary>A fixed generator start; by the guard's bound a false transient has probability below 10⁻⁴ in each test.</summary>
public sealed class TransientGuardTests
{
    private const int Channels = 5;
    private const int Bins = 6;
    private const double Interval = 0.1;

    private readonly TransientGuard _guard = new(Channels, Bins, TimeSpan.FromSeconds(60));
    private readonly Random _random = new(7);

    [Theory]
    [InlineData(1)]
    [InlineData(1e-9)]
    [InlineData(1e12)]
    public void A_steady_field_of_any_unit_loses_no_snapshot(double unit)
    {
        for (int k = 0; k < 5000; k++) Assert.True(Admit(_ => unit));
        Assert.Equal(0, _guard.LeftOut);
    }

    [Fact]
    public void Every_shot_of_30_decibels_is_left_out_and_nothing_else_is()
    {
        for (int k = 0; k < 3000; k++)
        {
            bool shot = k % 100 is 50 or 51 or 52;
            Assert.Equal(!shot, Admit(_ => shot ? Amplitude(30) : 1));
        }

        Assert.Equal(90, _guard.LeftOut);
    }

    [Fact]
    public void A_level_that_rises_by_12_decibels_in_a_minute_and_falls_again_is_followed()
    {
        for (int k = 0; k < 3000; k++)
        {
            double minutes = k * Interval / 60;
            double decibels = 12 * Math.Clamp(Math.Min(minutes - 1, 4 - minutes), 0, 1);
            Assert.True(Admit(_ => Amplitude(decibels)), $"at {minutes} min");
        }
    }

    [Fact]
    public void A_step_of_30_decibels_that_persists_is_followed_after_three_seconds()
    {
        for (int k = 0; k < 300; k++) Admit(_ => 1);
        int leftOut = 0;
        for (int k = 0; k < 300; k++) leftOut += Admit(_ => Amplitude(30)) ? 0 : 1;
        Assert.InRange(leftOut, 29, 30);
        for (int k = 0; k < 300; k++) Assert.True(Admit(_ => 1));
    }

    [Fact]
    public void One_channel_that_grows_loud_is_no_transient()
    {
        for (int k = 0; k < 300; k++) Admit(_ => 1);
        for (int k = 0; k < 300; k++) Assert.True(Admit(n => n == 2 ? Amplitude(40) : 1));
    }

    [Fact]
    public void Dead_channels_do_not_disturb_the_judgement()
    {
        for (int k = 0; k < 300; k++) Assert.True(Admit(n => n < 2 ? 0 : 1));
        Assert.False(Admit(n => n < 2 ? 0 : Amplitude(30)));
    }

    [Fact]
    public void Silence_and_then_sound_is_followed()
    {
        for (int k = 0; k < 100; k++) Assert.True(Admit(_ => 0));
        int leftOut = 0;
        for (int k = 0; k < 100; k++) leftOut += Admit(_ => 1) ? 0 : 1;
        Assert.InRange(leftOut, 29, 30);
    }

    [Fact]
    public void A_snapshot_that_is_not_finite_is_left_to_the_fold_and_teaches_nothing()
    {
        for (int k = 0; k < 100; k++) Admit(_ => 1);
        Assert.True(Admit(n => n == 1 ? double.NaN : 1));
        Assert.True(Admit(_ => 1));
        Assert.False(Admit(_ => Amplitude(30)));
    }

    // The remarks' figures; the limit solves t − 1 − ln t = 18/F, and 6 dB more.
    [Theory]
    [InlineData(1, 19.4)]
    [InlineData(12, 11.9)]
    [InlineData(64, 8.9)]
    public void The_limit_follows_the_number_of_bins(int bins, double decibels) =>
        Assert.Equal(decibels, 10 * Math.Log10(TransientGuard.LimitFor(bins)), 0.3);

    private static double Amplitude(double decibels) => Math.Pow(10, decibels / 20);

    private bool Admit(Func<int, double> amplitude)
    {
        float[] x = new float[2 * Bins * Channels];
        for (int i = 0; i < x.Length; i++)
        {
            double g = Math.Sqrt(-2 * Math.Log(1 - _random.NextDouble())) * Math.Cos(2 * Math.PI * _random.NextDouble());
            x[i] = (float)(g * amplitude(i / 2 % Channels));
        }

        double[] weight = new double[1];
        _guard.Weigh(x, Interval, weight);
        return weight[0] > 0;
    }
}
