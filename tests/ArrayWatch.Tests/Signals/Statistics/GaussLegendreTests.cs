using ArrayWatch.Signals.Statistics;

namespace ArrayWatch.Tests.Signals.Statistics;

public sealed class GaussLegendreTests
{
    // Exact for polynomials up to degree 2n − 1.
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(7)]
    [InlineData(40)]
    [InlineData(1001)]
    public void A_rule_is_exact_for_polynomials_of_its_degree(int nodes)
    {
        GaussLegendre rule = GaussLegendre.WithNodes(nodes);
        foreach (int degree in new[] { 0, 1, nodes, (2 * nodes) - 1 })
        {
            double sum = 0;
            for (int i = 0; i < nodes; i++) sum += rule.Weights[i] * Math.Pow(rule.Nodes[i], degree);
            Assert.Equal(1.0 / (degree + 1), sum, 1e-13);
        }

        Assert.Equal(rule.Nodes.Order(), rule.Nodes);
    }

    // Abramowitz and Stegun (1964), Table 25.4, n = 5 on [−1, 1]: 0.906179845938664 with weight 0.236926885056189.
    [Fact]
    public void The_rule_of_five_has_the_tabulated_node()
    {
        GaussLegendre rule = GaussLegendre.WithNodes(5);
        Assert.Equal((1 + 0.906179845938664) / 2, rule.Nodes[4], 1e-15);
        Assert.Equal(0.236926885056189 / 2, rule.Weights[4], 1e-15);
    }
}
