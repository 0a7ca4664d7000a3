using EvapMonitor.Benchmarks.Rating;
using EvapMonitor.Benchmarks.Steam;

// One name per benchmark; each returns the exit code of the program.
var benchmarks = new Dictionary<string, Func<int>>
{
    ["rating"] = RatingBenchmark.Run,
    ["steam"] = SteamBenchmark.Run,
};

if (args.Length == 1 && benchmarks.TryGetValue(args[0], out var benchmark))
    return benchmark();
Console.Error.WriteLine($"Usage: EvapMonitor.Benchmarks NAME, where NAME is one of: {string.Join(", ", benchmarks.Keys)}.");
return 2;
