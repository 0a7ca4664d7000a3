using EvapMonitor.Service.Commands;

return await CommandLine.RunAsync(args, ShutdownSignals.Token);
