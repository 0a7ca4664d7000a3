using System.Globalization;
using EvapMonitor.Benchmarks.Balances;
using EvapMonitor.Benchmarks.Fouling;
using EvapMonitor.Benchmarks.Ingest;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Benchmarks.Steam;

// One name per figure; "prove" writes it to docs/proof, without it it is only shown.
var figures = new Dictionary<string, Func<string[], Task<int>>>
{
    ["steam"] = _ => Task.FromResult(SteamBenchmark.Run()),
    ["import"] = ImportProof.RunAsync,
    ["rating"] = _ => Task.FromResult(RatingProof.Run()),
    ["speed"] = _ => Task.FromResult(SpeedProof.Run()),
    ["uncertainty"] = arguments => Task.FromResult(UncertaintyProof.Run(arguments)),
    ["instruments"] = arguments => Task.FromResult(InstrumentsProof.Run(arguments)),
    ["expectation"] = arguments => Task.FromResult(ExpectationProof.Run(arguments)),
    ["campaigns"] = arguments => Task.FromResult(CampaignsProof.Run(arguments)),
    ["ingest"] = IngestProof.RunAsync,
    ["database"] = DatabaseProof.RunAsync,
    ["kills"] = KillsProof.RunAsync,
    ["recompute"] = RecomputeProof.RunAsync,
    ["fuzz"] = FuzzProof.RunAsync,
};

// The other end of a comparison runs as a process of its own.
if (args is ["receive", var port, var messages])
    return LibraryAlone.Receive(int.Parse(port, CultureInfo.InvariantCulture), long.Parse(messages, CultureInfo.InvariantCulture));
string[] words = args is ["prove", .. var rest] ? rest : args;
if (words.Length >= 1 && figures.TryGetValue(words[0], out var figure)) return await figure(words[1..]);
Console.Error.WriteLine($"Which figure? One of: {string.Join(", ", figures.Keys)}.");
return 2;
