using System.ComponentModel;
using System.Diagnostics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace EvapMonitor.Benchmarks.Steam;

/// <summary>The hand-tuned C++ of handtuned/steam.cpp, built by g++ for this processor when asked for.</summary>
internal sealed class HandTunedSteam : IDisposable
{
    public delegate void Batch(double[] pressures, double[] temperatures, double[] answers, nuint count);

    private readonly DirectoryInfo _directory;
    private readonly nint _library;

    private HandTunedSteam(DirectoryInfo directory)
    {
        _directory = directory;
        _library = NativeLibrary.Load(Path.Combine(directory.FullName, "steam.so"));
    }

    /// <summary>Builds and loads it; null, with one line on standard error, where that cannot be done.</summary>
    public static HandTunedSteam? Build([CallerFilePath] string here = "")
    {
        var source = Path.Combine(Path.GetDirectoryName(here)!, "..", "handtuned", "steam.cpp");
        var directory = Directory.CreateTempSubdirectory("evapmonitor-steam-");
        // Loops stay scalar: the floor is one state per call, as balances make them, not vectors of states.
        string[] arguments = ["-std=c++17", "-O3", "-march=native", "-fno-tree-loop-vectorize", "-shared", "-fPIC", source, "-o", Path.Combine(directory.FullName, "steam.so")];
        try
        {
            using var compiler = Process.Start(new ProcessStartInfo("g++", arguments))!;
            compiler.WaitForExit();
            if (compiler.ExitCode == 0)
                return new HandTunedSteam(directory);
            Console.Error.WriteLine($"g++ failed with exit code {compiler.ExitCode}: the steam benchmark has nothing to compare with.");
        }
        catch (Win32Exception)
        {
            Console.Error.WriteLine("g++ was not found: install it (Debian: apt-get install g++) to compare with the hand-tuned implementation.");
        }
        directory.Delete(recursive: true);
        return null;
    }

    public Batch Function(string name) => Marshal.GetDelegateForFunctionPointer<Batch>(NativeLibrary.GetExport(_library, name));

    public void Dispose()
    {
        NativeLibrary.Free(_library);
        _directory.Delete(recursive: true);
    }
}
