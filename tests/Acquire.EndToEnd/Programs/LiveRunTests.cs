using System.Diagnostics;
using System.Globalization;
using System.Runtime.InteropServices;
using System.Text;
using System.Text.Json;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>Runs over real sockets and pseudo-terminals: ended by a signal, by an operator, by SIGKILL.</summary>
[Collection(ProcessCollection.Name)]
public sealed partial class LiveRunTests
{
    private const string Protocol = "protocols/germanium-quick.protocol.yaml";
    private const string Bench = "simulator/germanium-quick.bench.yaml";

    [Fact]
    public async Task Run_SigTerm_EndsSafelyAndSealsTheFile()
    {
        Unix();
        using var scratch = new Scratch();
        using var process = scratch.Start("run", Protocol, "--bench", Bench, "--foreground", "--out", "night.run");
        await LineAsync(process, "point 2");
        Assert.Equal(0, Kill(process.Id, SigTerm));
        var ended = await Scratch.WaitAsync(process, TimeSpan.FromSeconds(30));

        Assert.True(ended.ExitCode == 3, ended.ToString());
        await AssertSound(scratch, "night.run", "stopped");
        await AssertDeEnergised(scratch);
    }

    [Fact]
    public async Task Run_Killed_KeepsEveryReadingAndSaysItWasCut()
    {
        Unix();
        using var scratch = new Scratch();
        using var process = scratch.Start("run", Protocol, "--bench", Bench, "--foreground", "--out", "night.run");
        var acknowledged = await AcknowledgedAsync(process, "point 2");
        Assert.Equal(0, Kill(process.Id, SigKill));
        await Scratch.WaitAsync(process, TimeSpan.FromSeconds(30));

        var readings = await AssertSound(scratch, "night.run", "cut");
        Assert.True(readings >= acknowledged, $"{readings} readings in the file, {acknowledged} were acknowledged");
        Assert.True(acknowledged > 0, "nothing had been acknowledged");
    }

    [Fact]
    public async Task Tell_HoldContinueStop_ActOnABackgroundRun()
    {
        Unix();
        using var scratch = new Scratch();
        using var process = scratch.Start("run", Protocol, "--bench", Bench, "--out", "night.run");
        await LineAsync(process, "point 1");
        foreach (var verb in new[] { "hold", "continue" })
        {
            var told = await scratch.RunAsync("tell", "night.run", verb, "--operator", "A. Tester", "--reason", "trying the verbs");
            Assert.True(told.ExitCode == 0, told.ToString());
        }

        var nameless = await scratch.RunAsync("tell", "night.run", "stop");
        Assert.True(nameless.ExitCode == 2, nameless.ToString());

        var stop = await scratch.RunAsync("tell", "night.run", "stop", "--operator", "A. Tester", "--reason", "enough for tonight");
        Assert.True(stop.ExitCode == 0, stop.ToString());
        var ended = await Scratch.WaitAsync(process, TimeSpan.FromSeconds(30));
        Assert.True(ended.ExitCode == 3, ended.ToString());
        await AssertSound(scratch, "night.run", "stopped");

        var late = await scratch.RunAsync("tell", "night.run", "safe", "--operator", "A. Tester");
        Assert.True(late.ExitCode == 2, late.ToString());
        Assert.Contains("not running", late.Errors, StringComparison.OrdinalIgnoreCase);
    }

    [Fact]
    public async Task Tell_Safe_MakesTheBenchSafe()
    {
        Unix();
        using var scratch = new Scratch();
        using var process = scratch.Start("run", Protocol, "--bench", Bench, "--out", "night.run");
        await LineAsync(process, "point 1");
        var told = await scratch.RunAsync("tell", "night.run", "safe", "--operator", "A. Tester");
        Assert.True(told.ExitCode == 0, told.ToString());
        var ended = await Scratch.WaitAsync(process, TimeSpan.FromSeconds(30));
        Assert.True(ended.ExitCode == 3, ended.ToString());
        await AssertSound(scratch, "night.run", "stopped");
        await AssertDeEnergised(scratch);
    }

    private const int SigKill = 9;
    private const int SigTerm = 15;

    private static void Unix() => Assert.SkipWhen(OperatingSystem.IsWindows(), "Signals of this kind exist on Unix only.");

    [LibraryImport("libc", EntryPoint = "kill")]
    private static partial int Kill(int process, int signal);

    /// <summary>Reads the progress until a line holds the words.</summary>
    private static async Task<string> LineAsync(Process process, string words)
    {
        var seen = new StringBuilder();
        using var bound = new CancellationTokenSource(TimeSpan.FromSeconds(60));
        while (await process.StandardOutput.ReadLineAsync(bound.Token) is { } line)
        {
            seen.AppendLine(line);
            if (line.Contains(words, StringComparison.Ordinal))
            {
                return line;
            }
        }

        throw new InvalidOperationException($"The program ended before it said '{words}':\n{seen}\n{await process.StandardError.ReadToEndAsync(bound.Token)}");
    }

    /// <summary>Readings that the last progress line before the words said are on disk.</summary>
    private static async Task<long> AcknowledgedAsync(Process process, string words)
    {
        var line = await LineAsync(process, words);
        var at = line.IndexOf("on disk ", StringComparison.Ordinal);
        Assert.True(at > 0, line);
        var number = line[(at + "on disk ".Length)..].Split(' ')[0];
        return long.Parse(number, CultureInfo.InvariantCulture);
    }

    private static async Task<long> AssertSound(Scratch scratch, string run, string state)
    {
        var verified = await scratch.RunAsync("verify", run, "--json");
        Assert.True(verified.ExitCode == 0, verified.ToString());
        using var json = JsonDocument.Parse(verified.Output);
        Assert.Contains(state, json.RootElement.GetProperty("state").GetString(), StringComparison.Ordinal);
        return json.RootElement.GetProperty("readings").GetInt64();
    }

    /// <summary>Asks the simulated instruments themselves, over their own sockets, whether anything is still on.</summary>
    private static async Task AssertDeEnergised(Scratch scratch)
    {
        var note = Directory.EnumerateFiles(scratch["xdg"], "*.json", SearchOption.AllDirectories)
            .Single(path => path.Contains("simulators", StringComparison.Ordinal));
        using var json = JsonDocument.Parse(await File.ReadAllTextAsync(note));
        var asked = 0;
        foreach (var instrument in json.RootElement.GetProperty("Addresses").EnumerateObject())
        {
            var parts = instrument.Value.GetString()!.Split("::");
            if (parts[0] == "TCPIP")
            {
                Assert.Equal("0", await RawSocket.AskAsync(int.Parse(parts[2], CultureInfo.InvariantCulture), "OUTP?"));
                asked++;
            }
        }

        Assert.True(asked > 0, "no instrument on a socket");
    }
}
