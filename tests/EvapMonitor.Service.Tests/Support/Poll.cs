using System.Diagnostics;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>Waits on what is waited for, with a limit.</summary>
internal static class Poll
{
    /// <summary>Asks until the answer is not null; fails with the description after the limit.</summary>
    public static async Task<T> UntilAsync<T>(string awaited, Func<Task<T?>> ask, int limitSeconds = 30)
        where T : class
    {
        long began = Stopwatch.GetTimestamp();
        while (true)
        {
            if (await ask() is { } answer) return answer;
            Assert.True(Stopwatch.GetElapsedTime(began).TotalSeconds < limitSeconds, $"Not within {limitSeconds} s: {awaited}");
            await Task.Delay(TimeSpan.FromMilliseconds(30), TestContext.Current.CancellationToken);
        }
    }

    /// <summary>Asks until the answer is true.</summary>
    public static Task UntilAsync(string awaited, Func<Task<bool>> ask, int limitSeconds = 30) =>
        UntilAsync<object>(awaited, async () => await ask() ? awaited : null, limitSeconds);

    /// <summary>Looks until it is true.</summary>
    public static Task UntilAsync(string awaited, Func<bool> look, int limitSeconds = 30) => UntilAsync(awaited, () => Task.FromResult(look()), limitSeconds);
}
