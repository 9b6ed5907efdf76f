using ArrayWatch.Simulation;

namespace ArrayWatch.Tests.Simulation;

public sealed class RandomNumbersTests
{
    [Fact]
    public void Equal_start_values_give_equal_numbers_and_forks_differ()
    {
        RandomNumbers a = new(7), b = new(7);
        Assert.Equal(Enumerable.Range(0, 50).Select(_ => a.NextBits()), Enumerable.Range(0, 50).Select(_ => b.NextBits()));
        Assert.NotEqual(new RandomNumbers(7).Fork(1).NextBits(), new RandomNumbers(7).Fork(2).NextBits());
        Assert.Equal(a.Fork(3).NextBits(), new RandomNumbers(7).Fork(3).NextBits());
    }

    [Fact]
    public void Complex_gaussians_are_circular_with_unit_power()
    {
        const int Count = 200_000;
        RandomNumbers random = new(11);
        double power = 0, re = 0, im = 0, pseudoRe = 0, fourth = 0;
        for (int i = 0; i < Count; i++)
        {
            (double x, double y) = random.NextComplexGaussian();
            power += (x * x) + (y * y);
            fourth += ((x * x) + (y * y)) * ((x * x) + (y * y));
            re += x;
            im += y;
            pseudoRe += (x * x) - (y * y);
        }

        // Six deviations each: a false failure is less likely than 1e-7 for another start value.
        double six = 6 / Math.Sqrt(Count);
        Assert.InRange(power / Count, 1 - six, 1 + six);
        Assert.InRange(fourth / Count, 2 - (Math.Sqrt(20) * six), 2 + (Math.Sqrt(20) * six));
        Assert.InRange(re / Count, -six, six);
        Assert.InRange(im / Count, -six, six);
        Assert.InRange(pseudoRe / Count, -six, six);
    }

    [Fact]
    public void Chosen_integers_are_distinct_and_in_range()
    {
        RandomNumbers random = new(3);
        for (int i = 0; i < 200; i++)
        {
            int[] chosen = random.Choose(5, 9);
            Assert.Equal(5, chosen.Distinct().Count());
            Assert.All(chosen, c => Assert.InRange(c, 0, 8));
            Assert.InRange(random.Integer(-2, 2), -2, 2);
        }

        Assert.Throws<ArgumentOutOfRangeException>(() => random.Choose(4, 3));
    }
}
