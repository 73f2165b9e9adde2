using System.Net.Sockets;
using System.Text;
using Acquire.Simulator.Serving;
using Acquire.Simulator.Tests.Twins;
using Acquire.Wire;

namespace Acquire.Simulator.Tests.Serving;

public sealed class DeviceServerTests
{
    [Fact]
    public void Tcp_SeveralClientsInTurn_AreAllAnswered()
    {
        using var server = TcpDeviceServer.Start(Port("controller"), TimeProvider.System);
        for (var i = 0; i < 3; i++)
        {
            using var client = Connect(server);
            Assert.StartsWith("ACQUIRE,SIMULATED TEMPERATURE CONTROLLER", Ask(client, "*IDN?"), StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Tcp_ClientThatDropsInTheMiddle_LeavesNothingToTheNext()
    {
        using var server = TcpDeviceServer.Start(Port("controller"), TimeProvider.System);
        using (var rude = Connect(server))
        {
            rude.Send("MEAS:TE"u8);
            rude.LingerState = new LingerOption(true, 0);
        }
        using var client = Connect(server);
        Assert.Equal("0,\"No error\"\n", Ask(client, "SYST:ERR?"));
    }

    [Fact]
    public void Tcp_SecondClient_IsAnsweredWhenTheFirstHasGone()
    {
        using var server = TcpDeviceServer.Start(Port("lamp"), TimeProvider.System);
        using var first = Connect(server);
        Assert.Equal("1\n", Ask(first, "*OPC?"));
        using var second = Connect(server);
        second.Send("*OPC?\n"u8);
        Assert.Equal("1\n", Ask(first, "*OPC?"));
        Assert.Equal(0, second.Available);
        first.Dispose();
        Assert.Equal("1\n", ReadLine(second));
    }

    [Fact]
    public void Tcp_Stopped_RefusesAndCanBeStoppedTwice()
    {
        var server = TcpDeviceServer.Start(Port("lamp"), TimeProvider.System);
        using var client = Connect(server);
        Assert.Equal("1\n", Ask(client, "*OPC?"));
        server.Dispose();
        server.Dispose();
        Assert.Throws<SocketException>(() => Connect(server));
    }

    [Fact]
    public void Tcp_PortThatIsTaken_IsRefusedWithTheRemedy()
    {
        using var server = TcpDeviceServer.Start(Port("lamp"), TimeProvider.System);
        var problem = Assert.Throws<LinkException>(() => TcpDeviceServer.Start(Port("lamp"), TimeProvider.System, server.TcpPort));
        Assert.Contains("Write port 0 in the bench file", problem.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Tcp_OurOwnLink_ReadsTheMeterThroughIt()
    {
        using var server = TcpDeviceServer.Start(Port("meter"), TimeProvider.System);
        Assert.Equal(3, (await AskOverLink(server.Address, "READ?")).Split(',').Length);
    }

    [Fact]
    public async Task Pty_OurOwnLink_RoundTripsWithoutEcho()
    {
        if (!OperatingSystem.IsLinux() && !OperatingSystem.IsMacOS()) Assert.Skip("This system has no pseudo-terminals.");
        else
        {
            using var server = PseudoTerminalServer.Start(Port("meter"), TimeProvider.System);
            Assert.StartsWith("ACQUIRE,SIMULATED SOURCE-METER", await AskOverLink(server.Address, "*IDN?"), StringComparison.Ordinal);
            // A second client finds the line as the first one did.
            Assert.Equal("1\n", await AskOverLink(server.Address, "*OPC?"));
        }
    }

    [Fact]
    public async Task Pty_ClientThatNeverReads_DoesNotHoldUpTheServer()
    {
        if (!OperatingSystem.IsLinux()) Assert.Skip("Only Linux gives a pseudo-terminal that never waits.");
        else
        {
            using var server = PseudoTerminalServer.Start(Port("meter"), TimeProvider.System);
            await using (var link = new LinkFactory().Create(server.Address, new LinkSettings()))
            {
                await link.OpenAsync(CancellationToken.None);
                for (var i = 0; i < 2000; i++) await link.WriteAsync("*IDN?\n"u8.ToArray(), CancellationToken.None);
            }
            server.Dispose();
            Assert.False(File.Exists(server.Path));
        }
    }

    [Fact]
    public void Tcp_StoppedWhileTheDeviceIsBusy_EndsAtOnce()
    {
        var clock = new Acquire.Simulator.Time.VirtualTime(DateTimeOffset.UnixEpoch).Clock;
        var server = TcpDeviceServer.Start(Port("meter"), clock);
        using var client = Connect(server);
        client.Send("READ?\n"u8);
        // The device waits on a clock that stands still: only the stop can end it, and then the client sees the end of the line.
        server.Dispose();
        Assert.Equal(0, ReceiveOrEnd(client));
    }

    // A stop that comes before the server has read what was sent ends the connection with a reset.
    private static int ReceiveOrEnd(Socket client)
    {
        try
        {
            return client.Receive(new byte[16]);
        }
        catch (SocketException problem) when (problem.SocketErrorCode == SocketError.ConnectionReset)
        {
            return 0;
        }
    }

    [Fact]
    public void Pty_Stopped_TakesItsTerminalAway()
    {
        if (!OperatingSystem.IsLinux() && !OperatingSystem.IsMacOS()) Assert.Skip("This system has no pseudo-terminals.");
        else
        {
            var server = PseudoTerminalServer.Start(Port("meter"), TimeProvider.System);
            var path = server.Path;
            Assert.True(File.Exists(path));
            server.Dispose();
            server.Dispose();
            Assert.False(File.Exists(path));
        }
    }

    [Fact]
    public async Task Host_QuickBench_ServesSerialOnATerminalAndTheRestOnSockets()
    {
        var bench = ShippedBenches.Bench("germanium-quick");
        var started = await SimulatedBenchHost.StartAsync(bench, 5, TimeProvider.System);
        Assert.NotNull(started.Value);
        await using var host = started.Value;
        Assert.Equal(["controller", "lamp", "meter"], host.Addresses.Keys.Order(StringComparer.Ordinal));
        Assert.StartsWith("TCPIP::127.0.0.1::", host.Addresses["controller"], StringComparison.Ordinal);
        Assert.StartsWith(OperatingSystem.IsWindows() ? "TCPIP::" : "ASRL/", host.Addresses["meter"], StringComparison.Ordinal);
        foreach (var address in host.Addresses.Values) Assert.EndsWith(",S5,1\n", await AskOverLink(address, "*IDN?"), StringComparison.Ordinal);
    }

    [Fact]
    public async Task Host_TwinThatIsMissing_SaysWhichFile()
    {
        var bench = ShippedBenches.Bench("germanium-quick") with { TwinFile = "nowhere.twin.yaml" };
        var started = await SimulatedBenchHost.StartAsync(bench, 5, TimeProvider.System);
        Assert.Null(started.Value);
        Assert.Contains("nowhere.twin.yaml", Assert.Single(started.Diagnostics).ToString(), StringComparison.Ordinal);
    }

    private static IDevicePort Port(string instrument) =>
        new SimulatedBench(ShippedBenches.Bench("germanium-quick"), ShippedBenches.Twin("germanium-quick"), 1, TimeProvider.System).PortFor(instrument);

    private static Socket Connect(TcpDeviceServer server)
    {
        var client = new Socket(AddressFamily.InterNetwork, SocketType.Stream, ProtocolType.Tcp) { ReceiveTimeout = 30_000 };
        client.Connect("127.0.0.1", server.TcpPort);
        return client;
    }

    private static string Ask(Socket client, string message)
    {
        client.Send(Encoding.ASCII.GetBytes(message + "\n"));
        return ReadLine(client);
    }

    private static string ReadLine(Socket client)
    {
        var buffer = new byte[1024];
        var text = new StringBuilder();
        while (!text.ToString().EndsWith('\n')) text.Append(Encoding.ASCII.GetString(buffer, 0, client.Receive(buffer)));
        return text.ToString();
    }

    private static async Task<string> AskOverLink(string address, string message)
    {
        using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(30), TimeProvider.System);
        await using var link = new LinkFactory().Create(address, new LinkSettings());
        await link.OpenAsync(limit.Token);
        await link.WriteAsync(Encoding.ASCII.GetBytes(message + "\n"), limit.Token);
        var buffer = new byte[1024];
        var text = new StringBuilder();
        while (!text.ToString().EndsWith('\n')) text.Append(Encoding.ASCII.GetString(buffer, 0, await link.ReadAsync(buffer, limit.Token)));
        return text.ToString();
    }
}
