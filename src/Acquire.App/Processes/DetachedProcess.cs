using System.Diagnostics;
using System.Reflection;
using System.Runtime.InteropServices;

namespace Acquire.App.Processes;

/// <summary>
/// This program started once more, in a session of its own, so that it outlives the terminal and its parent.
/// The child says one line on its standard output when it is ready (or why it is not) and never writes to it again.
/// </summary>
internal static partial class DetachedProcess
{
    /// <summary>Starts the program with the given arguments and waits, bounded, for its first line.</summary>
    /// <returns>The child's process id and the line; the line is null when the child ended or stayed silent.</returns>
    public static async Task<(int ProcessId, string? Line)> StartAsync(IReadOnlyList<string> arguments, TimeSpan bound, CancellationToken cancellation)
    {
        var start = new ProcessStartInfo
        {
            FileName = Environment.ProcessPath ?? throw new InvalidOperationException("The program does not know its own path."),
            UseShellExecute = false,
            RedirectStandardInput = true,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            CreateNoWindow = true,
        };
        // Run by the dotnet host, the program is the host's first argument.
        if (Path.GetFileNameWithoutExtension(start.FileName).Equals("dotnet", StringComparison.OrdinalIgnoreCase))
        {
            start.ArgumentList.Add(Assembly.GetEntryAssembly()!.Location); // an entry assembly exists in a started program
        }

        foreach (var argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        using var child = Process.Start(start) ?? throw new InvalidOperationException("The child process did not start.");
        child.StandardInput.Close();
        using var deadline = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        deadline.CancelAfter(bound);
        try
        {
            return (child.Id, await child.StandardOutput.ReadLineAsync(deadline.Token));
        }
        catch (OperationCanceledException) when (!cancellation.IsCancellationRequested)
        {
            return (child.Id, null);
        }
    }

    /// <summary>Called by the child before anything else: leaves the parent's session and ignores the terminal's hang-up.</summary>
    public static IDisposable LeaveSession()
    {
        if (OperatingSystem.IsWindows())
        {
            return new MemoryStream();
        }

        _ = SetSession(); // fails harmlessly when the process already leads a session
        return PosixSignalRegistration.Create(PosixSignal.SIGHUP, context => context.Cancel = true);
    }

    [LibraryImport("libc", EntryPoint = "setsid")]
    private static partial int SetSession();
}
