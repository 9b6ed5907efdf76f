using ArrayWatch.Commands;
using ArrayWatch.Tests.Configuration;

namespace ArrayWatch.Tests.Programs;

public sealed class CheckCommandTests
{
    [Fact]
    public void A_good_configuration_is_summed_up()
    {
        using StringWriter output = new(), errors = new();
        Assert.Equal(0, CheckCommand.Run(Repository.PathOf("config", "arraywatch.json"), output, errors));
        Assert.Empty(errors.ToString());
        Assert.Contains("channels      32, H1 to H32, in 4 groups", output.ToString(), StringComparison.Ordinal);
        Assert.Contains("aperture      23.25 m, smallest spacing 0.75 m", output.ToString(), StringComparison.Ordinal);
        // c / 2d = 1500 / 1.5.
        Assert.Contains("half a wavelength is the smallest spacing at 1000 Hz", output.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void A_missing_file_is_a_bad_configuration()
    {
        using StringWriter output = new(), errors = new();
        Assert.Equal(2, CheckCommand.Run("/nowhere/arraywatch.json", output, errors));
        Assert.Empty(output.ToString());
        Assert.Contains("/nowhere/arraywatch.json", errors.ToString(), StringComparison.Ordinal);
    }
}
