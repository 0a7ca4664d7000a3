using System.Runtime.InteropServices;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Exit codes of every command.</summary>
internal static class Exit
{
    public const int Done = 0, Failed = 1, WrongUse = 2, DoneWithRejected = 3;
}

/// <summary>Turns an error into one line on stderr for each problem, and an exit code.</summary>
internal static class Failure
{
    public static int Tell(Exception error, ITypeResolver? resolver)
    {
        switch (error)
        {
            case StartException start:
                foreach (string problem in start.Problems) Console.Error.WriteLine(problem);
                return Exit.Failed;
            case CommandParseException or CommandRuntimeException:
                Console.Error.WriteLine(error.Message);
                return Exit.WrongUse;
            case OperationCanceledException:
                return Exit.Failed;
            default:
                Console.Error.WriteLine(error is IOException or UnauthorizedAccessException or HttpRequestException ? error.Message : error.ToString());
                return Exit.Failed;
        }
    }
}

/// <summary>Ctrl-C and a polite kill end every command in an orderly way.</summary>
internal static class ShutdownSignals
{
    private static readonly CancellationTokenSource Source = new();
    private static readonly PosixSignalRegistration[] Registrations =
        [.. new[] { PosixSignal.SIGINT, PosixSignal.SIGTERM }.Select(signal => PosixSignalRegistration.Create(signal, Stop))];

    public static CancellationToken Token => Registrations.Length > 0 ? Source.Token : default;

    private static void Stop(PosixSignalContext context)
    {
        context.Cancel = true;
        Source.Cancel();
    }
}
