using System.Globalization;
using System.Text.Json;
using Xunit;

namespace Acquire.EndToEnd.Programs;

/// <summary>The simulated source-meter asked by clients that are not ours: netcat, and lxi-tools where installed.</summary>
[Collection(ProcessCollection.Name)]
public sealed class ForeignClientTests
{
    [Fact]
    public async Task SimulatedSourceMeter_AskedByNetcat_Answers()
    {
        Peers.Require("nc");
        using var scratch = new Scratch();
        await using var simulator = await SimulatorProcess.StartAsync(scratch);
        var port = simulator.Port("source-meter").ToString(CultureInfo.InvariantCulture);

        var answers = await Peers.RunWithInputAsync(scratch.Folder,
            "*IDN?\nSOUR:VOLT 0.2\nSOUR:VOLT?\nOUTP ON\nOUTP?\nREAD?\nFLY:ME?\nSYST:ERR?\nSYST:ERR?\n", "nc", "-q", "2", "-w", "5", "127.0.0.1", port);
        var lines = answers.Output.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);

        Assert.True(lines.Length == 6, answers.ToString());
        Assert.Contains("SOURCE-METER", lines[0], StringComparison.Ordinal);
        Assert.Equal(0.2, double.Parse(lines[1], CultureInfo.InvariantCulture), 9);
        Assert.Equal("1", lines[2]);
        Assert.Equal(3, lines[3].Split(',').Length);
        Assert.StartsWith("-113", lines[4], StringComparison.Ordinal); // SCPI-1999: undefined header
        Assert.StartsWith("0,", lines[5], StringComparison.Ordinal);
    }

    [Fact]
    public async Task SimulatedSourceMeter_AskedByLxiTools_Answers()
    {
        Peers.Require("lxi");
        using var scratch = new Scratch();
        await using var simulator = await SimulatorProcess.StartAsync(scratch);
        var port = simulator.Port("source-meter").ToString(CultureInfo.InvariantCulture);

        var answer = await Peers.RunAsync(scratch.Folder, "lxi", "scpi", "--address", "127.0.0.1", "--raw", "--port", port, "*IDN?");
        Assert.True(answer.ExitCode == 0, answer.ToString());
        Assert.Contains("SOURCE-METER", answer.Output, StringComparison.Ordinal);
    }
}

/// <summary>A simulator serving the cryostat bench as a process of its own.</summary>
internal sealed class SimulatorProcess : IAsyncDisposable
{
    private readonly System.Diagnostics.Process _process;
    private readonly Dictionary<string, string> _addresses;

    private SimulatorProcess(System.Diagnostics.Process process, Dictionary<string, string> addresses)
    {
        _process = process;
        _addresses = addresses;
    }

    public static async Task<SimulatorProcess> StartAsync(Scratch scratch)
    {
        var process = scratch.Start("simulate", "simulator/germanium-cryostat.bench.yaml", "--json");
        using var bound = new CancellationTokenSource(TimeSpan.FromSeconds(30));
        var line = await process.StandardOutput.ReadLineAsync(bound.Token);
        using var json = JsonDocument.Parse(line!); // the first line is the announcement; null fails the test here
        var addresses = json.RootElement.GetProperty("Addresses").EnumerateObject()
            .ToDictionary(entry => entry.Name, entry => entry.Value.GetString()!, StringComparer.Ordinal);
        return new(process, addresses);
    }

    /// <summary>The TCP port of the first instrument whose identity or name holds the word.</summary>
    public int Port(string word)
    {
        var name = word == "source-meter" ? "meter" : word;
        var parts = _addresses[name].Split("::");
        Assert.SkipUnless(parts[0] == "TCPIP", $"{name} is served at {_addresses[name]}, not on a socket");
        return int.Parse(parts[2], CultureInfo.InvariantCulture);
    }

    public async ValueTask DisposeAsync()
    {
        _process.Kill();
        await _process.WaitForExitAsync();
        _process.Dispose();
    }
}
