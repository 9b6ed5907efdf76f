namespace ArrayWatch.EndToEnd.Tests.Service;

public sealed class DemoTests
{
    [Fact]
    public async Task The_demonstration_prints_its_address_tells_the_first_true_alert_and_ends_cleanly()
    {
        await using ServiceProcess demo = ServiceProcess.Start("demo");
        string line = await demo.LineAsync(static l => l.StartsWith("Pages:", StringComparison.Ordinal));
        using HttpClient http = new() { BaseAddress = new Uri(line.Split(' ', StringSplitOptions.RemoveEmptyEntries)[1]) };
        Assert.Contains("plover", await http.GetStringAsync("/api/arrays", TestContext.Current.CancellationToken), StringComparison.Ordinal);
        string alert = await demo.LineAsync(static l => l.Contains("  ALERT  ", StringComparison.Ordinal));
        Assert.True(alert.Contains("dead of H7", StringComparison.Ordinal) || alert.Contains("polarity of M05", StringComparison.Ordinal) || alert.Contains("polarity of M5", StringComparison.Ordinal), alert);
        await demo.SignalAsync("INT");
        Assert.Equal(0, await demo.EndAsync());
        Assert.Empty(demo.Errors);
    }
}
