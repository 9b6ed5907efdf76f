using System.Runtime.CompilerServices;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>Waits for a condition that other processes bring about.</summary>
internal static class Eventually
{
    private static readonly TimeSpan _limit = TimeSpan.FromSeconds(60);

    /// <summary>Returns as soon as the condition holds; fails after a minute, which no healthy run comes near.</summary>
    public static async Task HoldsAsync(Func<bool> condition, [CallerArgumentExpression(nameof(condition))] string? text = null)
    {
        using CancellationTokenSource limit = new(_limit);
        using PeriodicTimer timer = new(TimeSpan.FromMilliseconds(10));
        while (!condition())
        {
            try
            {
                await timer.WaitForNextTickAsync(limit.Token);
            }
            catch (OperationCanceledException)
            {
                Assert.Fail($"Did not hold within {_limit.TotalSeconds} s: {text}");
            }
        }
    }
}
