namespace ArrayWatch.Tests;

public sealed class PlaceholderTests
{
    [Fact]
    public void Runs() => Assert.Equal(4, 2 + 2);
}
