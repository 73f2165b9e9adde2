using System.ComponentModel;
using System.Diagnostics;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>Programs that are not ours and that some tests talk to.</summary>
internal static class Peers
{
    /// <summary>Skips the test, with the reason, when the machine lacks the program; fails it when peers are required.</summary>
    public static void Require(string program)
    {
        var found = (Environment.GetEnvironmentVariable("PATH") ?? "").Split(Path.PathSeparator)
            .Any(folder => File.Exists(Path.Combine(folder, program)));
        if (found)
        {
            return;
        }

        Assert.False(Environment.GetEnvironmentVariable("ACQUIRE_REQUIRE_PEERS") == "1", $"{program} is required and is not installed.");
        Assert.Skip($"{program} is not installed on this machine.");
    }

    /// <summary>The folder with open data sets, or skips the test.</summary>
    public static string OpenData()
    {
        var folder = Environment.GetEnvironmentVariable("ACQUIRE_OPEN_DATA");
        if (string.IsNullOrEmpty(folder) || !Directory.Exists(folder))
        {
            Assert.Skip("ACQUIRE_OPEN_DATA names no folder on this machine.");
        }

        return folder;
    }

    /// <summary>Runs a peer to its end, bounded, with nothing or the given text on its standard input.</summary>
    public static async Task<Ended> RunAsync(string folder, string program, params string[] arguments) =>
        await RunWithInputAsync(folder, "", program, arguments);

    /// <summary>Runs a peer to its end, bounded, with the given text on its standard input.</summary>
    public static async Task<Ended> RunWithInputAsync(string folder, string input, string program, params string[] arguments)
    {
        var start = new ProcessStartInfo(program)
        {
            WorkingDirectory = folder,
            UseShellExecute = false,
            RedirectStandardInput = true,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        foreach (var argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        try
        {
            using var process = Process.Start(start)!; // UseShellExecute is off: a process is always made
            await process.StandardInput.WriteAsync(input);
            process.StandardInput.Close();
            return await Scratch.WaitAsync(process, TimeSpan.FromSeconds(30));
        }
        catch (Win32Exception missing)
        {
            Assert.Skip($"{program}: {missing.Message}");
            throw; // Skip has thrown already
        }
    }
}
