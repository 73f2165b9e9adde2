using System.Diagnostics;
using System.Text.Json;

namespace Acquire.Benchmarks;

/// <summary>The built program as a process of its own, start-up included.</summary>
internal static class WholeProgram
{
    private const int Runs = 3;

    /// <summary>The twelve-hour cryostat protocol under virtual time, and whether equal seeds give equal chain heads.</summary>
    public static IEnumerable<Figure> Rehearsal()
    {
        using var scratch = new ScratchFolder();
        var seconds = new List<double>();
        var heads = new HashSet<string>();
        for (var run = 0; run < Runs; run++)
        {
            var path = scratch[FormattableString.Invariant($"night-{run}.run")];
            seconds.Add(Start("rehearse", "protocols/germanium-night.protocol.yaml", "--bench", "simulator/germanium-cryostat.bench.yaml", "--seed", "7", "--out", path).Seconds);
            using var json = JsonDocument.Parse(Start("verify", path, "--json").Output);
            heads.Add(json.RootElement.GetProperty("chainHead").GetString() ?? "");
        }

        yield return new("rehearsal of the twelve-hour protocol, wall", Series.Median(seconds), "s", 5, 3, Series.Words(seconds, "s"));
        yield return new("different chain heads from equal seeds", heads.Count - 1, "", 0, 0, heads.First()[..16]);
    }

    /// <summary>The README's main command; takes about a minute.</summary>
    public static Figure MainJob()
    {
        using var scratch = new ScratchFolder();
        var (seconds, _) = Start("run", "protocols/germanium-quick.protocol.yaml", "--bench", "simulator/germanium-quick.bench.yaml", "--out", scratch["main.run"]);
        return new("README's main command, wall after build", seconds, "s", 90, 60, "once");
    }

    private static (double Seconds, string Output) Start(params string[] arguments)
    {
        var start = new ProcessStartInfo("dotnet") { WorkingDirectory = Root(), RedirectStandardOutput = true, UseShellExecute = false };
        start.ArgumentList.Add(Path.Combine(AppContext.BaseDirectory, "acquire.dll"));
        foreach (var argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        var begin = Stopwatch.GetTimestamp();
        using var process = Process.Start(start)!; // UseShellExecute is off: a process is always made
        var output = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        return process.ExitCode == 0
            ? (Stopwatch.GetElapsedTime(begin).TotalSeconds, output)
            : throw new InvalidOperationException($"acquire {string.Join(' ', arguments)} ended with {process.ExitCode}:\n{output}");
    }

    private static string Root()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder.FullName, "Acquire.sln")))
        {
            folder = folder.Parent ?? throw new DirectoryNotFoundException("Acquire.sln");
        }

        return folder.FullName;
    }
}
