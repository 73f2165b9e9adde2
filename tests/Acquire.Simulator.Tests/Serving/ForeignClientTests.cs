using System.Diagnostics;
using Acquire.Simulator.Serving;
using Acquire.Simulator.Tests.Twins;

namespace Acquire.Simulator.Tests.Serving;

/// <summary>Clients that are not ours talk to the simulated source-meter over a raw socket.</summary>
public sealed class ForeignClientTests
{
    [Fact]
    public void Netcat_AskingTheMeter_GetsItsReplies()
    {
        using var server = Serve();
        var answer = Run("nc", FormattableString.Invariant($"-w 5 127.0.0.1 {server.TcpPort}"), "*IDN?;:SOUR:VOLT?\nWRONG\nSYST:ERR?\n", lines: 2);
        Assert.Equal("ACQUIRE,SIMULATED SOURCE-METER,S1,1;0\n-113,\"Undefined header\"\n", answer);
    }

    [Fact]
    public void Lxi_AskingTheMeter_GetsItsReplies()
    {
        using var server = Serve();
        var answer = Run("lxi", FormattableString.Invariant($"scpi --address 127.0.0.1 --raw --port {server.TcpPort} *IDN?"), "", lines: 1);
        Assert.Equal("ACQUIRE,SIMULATED SOURCE-METER,S1,1\n", answer);
    }

    private static TcpDeviceServer Serve() => TcpDeviceServer.Start(
        new SimulatedBench(ShippedBenches.Bench("germanium-quick"), ShippedBenches.Twin("germanium-quick"), 1, TimeProvider.System).PortFor("meter"),
        TimeProvider.System);

    private static string Run(string program, string arguments, string input, int lines)
    {
        var start = new ProcessStartInfo(program, arguments) { RedirectStandardInput = true, RedirectStandardOutput = true };
        using var process = Started(start);
        process.StandardInput.Write(input);
        process.StandardInput.Flush();
        var text = "";
        for (var i = 0; i < lines && process.StandardOutput.ReadLine() is { } line; i++) text += line + "\n";
        process.StandardInput.Close();
        process.Kill();
        process.WaitForExit(TimeSpan.FromSeconds(30));
        return text;
    }

    private static Process Started(ProcessStartInfo start)
    {
        try
        {
            return Process.Start(start)!; // Null only for a document opened by the shell, which is not asked for.
        }
        catch (System.ComponentModel.Win32Exception problem)
        {
            var missing = $"{start.FileName} is not on this machine: {problem.Message}";
            if (Environment.GetEnvironmentVariable("ACQUIRE_REQUIRE_PEERS") == "1") Assert.Fail(missing);
            Assert.Skip(missing);
            throw;
        }
    }
}
