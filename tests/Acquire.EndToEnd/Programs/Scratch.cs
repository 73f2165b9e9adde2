using System.Diagnostics;
using System.Text;
using Acquire.EndToEnd.Sources;

namespace Acquire.EndToEnd.Programs;

/// <summary>What a finished program left behind.</summary>
internal sealed record Ended(int ExitCode, string Output, string Errors)
{
    public override string ToString() => $"exit {ExitCode}\n--- output\n{Output}\n--- errors\n{Errors}";
}

/// <summary>The built program, started as a process of its own in a scratch folder that holds copies of the shipped files.</summary>
internal sealed class Scratch : IDisposable
{
    private static int _count;

    public Scratch()
    {
        Folder = Path.Combine(Path.GetTempPath(), $"acquire-tests-{Environment.ProcessId}-{Interlocked.Increment(ref _count)}");
        Directory.CreateDirectory(Folder);
        Directory.CreateDirectory(Path.Combine(Folder, "xdg"));
        foreach (var folder in new[] { "protocols", "simulator", "drivers" })
        {
            Directory.CreateDirectory(Path.Combine(Folder, folder));
            foreach (var file in Directory.EnumerateFiles(Path.Combine(SourceTree.Root, folder)))
            {
                File.Copy(file, Path.Combine(Folder, folder, Path.GetFileName(file)));
            }
        }
    }

    /// <summary>The folder, also the program's working folder.</summary>
    public string Folder { get; }

    /// <summary>Path of a file in the folder.</summary>
    public string this[string relative] => Path.Combine(Folder, relative);

    /// <summary>Starts the program and does not wait.</summary>
    public Process Start(params string[] arguments)
    {
        var start = new ProcessStartInfo("dotnet")
        {
            WorkingDirectory = Folder,
            UseShellExecute = false,
            RedirectStandardInput = true,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.ArgumentList.Add(Path.Combine(AppContext.BaseDirectory, "acquire.dll"));
        foreach (var argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        // Sockets, notes and logs of a test stay in its own folder, and simulators do not outlive it for long.
        start.Environment["XDG_RUNTIME_DIR"] = Path.Combine(Folder, "xdg");
        start.Environment["XDG_STATE_HOME"] = Path.Combine(Folder, "xdg");
        start.Environment["XDG_CONFIG_HOME"] = Path.Combine(Folder, "xdg");
        start.Environment["NO_COLOR"] = "1";
        return Process.Start(start)!; // UseShellExecute is off: a process is always made
    }

    /// <summary>Runs the program to its end, bounded.</summary>
    public async Task<Ended> RunAsync(params string[] arguments)
    {
        using var process = Start(arguments);
        process.StandardInput.Close();
        return await WaitAsync(process, TimeSpan.FromSeconds(150));
    }

    /// <summary>Waits for a started program, bounded; kills it when the bound passes.</summary>
    public static async Task<Ended> WaitAsync(Process process, TimeSpan bound)
    {
        var output = process.StandardOutput.ReadToEndAsync();
        var errors = process.StandardError.ReadToEndAsync();
        using var deadline = new CancellationTokenSource(bound);
        try
        {
            await process.WaitForExitAsync(deadline.Token);
        }
        catch (OperationCanceledException)
        {
            process.Kill(entireProcessTree: true);
            throw new TimeoutException($"Still running after {bound}. Output so far:\n{await output}\n{await errors}");
        }

        return new Ended(process.ExitCode, await output, await errors);
    }

    /// <summary>Splits a command line as a shell would, for the plain commands of the documentation.</summary>
    public static string[] Split(string command)
    {
        var words = new List<string>();
        var word = new StringBuilder();
        var quoted = false;
        foreach (var letter in command)
        {
            if (letter is '"' or '\'')
            {
                quoted = !quoted;
            }
            else if (letter == ' ' && !quoted)
            {
                if (word.Length > 0)
                {
                    words.Add(word.ToString());
                }

                word.Clear();
            }
            else
            {
                word.Append(letter);
            }
        }

        if (word.Length > 0)
        {
            words.Add(word.ToString());
        }

        return [.. words];
    }

    public void Dispose()
    {
        foreach (var note in Directory.EnumerateFiles(Folder, "*.pid", SearchOption.AllDirectories))
        {
            StopNoted(note);
        }

        try
        {
            Directory.Delete(Folder, recursive: true);
        }
        catch (IOException)
        {
            // A process that is just ending may still hold a file; the folder lies in the system's temporary folder.
        }
    }

    private static void StopNoted(string note)
    {
        try
        {
            using var process = Process.GetProcessById(int.Parse(File.ReadAllText(note), System.Globalization.CultureInfo.InvariantCulture));
            process.Kill();
            process.WaitForExit(5000);
        }
        catch (Exception gone) when (gone is ArgumentException or InvalidOperationException or IOException or FormatException)
        {
            // Already gone.
        }
    }
}
