using Acquire.Bench.Files;
using Acquire.Bench.Text;
using Acquire.Wire;

namespace Acquire.Simulator.Serving;

/// <summary>A simulated bench on real sockets and pseudo-terminals, for other processes to talk to.</summary>
/// <remarks>
/// Instruments with a serial address get a pseudo-terminal where the system has them, all others a TCP socket on the
/// loopback interface: on the port that the bench file names, or on a free one when it names 0.
/// </remarks>
public sealed class SimulatedBenchHost : IAsyncDisposable
{
    private readonly List<IDeviceServer> _servers;

    private SimulatedBenchHost(SimulatedBench bench, Dictionary<string, string> addresses, List<IDeviceServer> servers)
    {
        Bench = bench;
        Addresses = addresses;
        _servers = servers;
    }

    /// <summary>The bench that is served.</summary>
    public SimulatedBench Bench { get; }

    /// <summary>Address of each instrument, by its name in the bench file.</summary>
    public IReadOnlyDictionary<string, string> Addresses { get; }

    /// <summary>Serves every instrument of a bench, played by its twin.</summary>
    /// <param name="bench">The bench file: addresses, roles, and the name of the twin file.</param>
    /// <param name="seed">Decides all noise.</param>
    /// <param name="scaledClock">The clock of the bench, at which its devices also take their time.</param>
    /// <returns>The host, or what is wrong in the twin file.</returns>
    /// <exception cref="LinkException">A port is taken, or there is no pseudo-terminal; whatever was started is stopped again.</exception>
    public static Task<Parsed<SimulatedBenchHost>> StartAsync(BenchFile bench, ulong seed, TimeProvider scaledClock)
    {
        var simulated = SimulatedBench.Open(bench, seed, scaledClock);
        return Task.FromResult(simulated.Value is null
            ? Parsed.Bad<SimulatedBenchHost>(simulated.Diagnostics)
            : Parsed.Good(Serve(bench, simulated.Value, scaledClock)));
    }

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        foreach (var server in _servers) server.Dispose();
        return ValueTask.CompletedTask;
    }

    private static SimulatedBenchHost Serve(BenchFile bench, SimulatedBench simulated, TimeProvider scaledClock)
    {
        List<IDeviceServer> servers = [];
        Dictionary<string, string> addresses = new(StringComparer.Ordinal);
        try
        {
            foreach (var instrument in bench.Instruments.Where(i => simulated.InstrumentNames.Contains(i.Name)))
            {
                var server = Serve(instrument, simulated.PortFor(instrument.Name), scaledClock);
                servers.Add(server);
                addresses.Add(instrument.Name, server.Address);
            }
        }
        catch (LinkException)
        {
            foreach (var server in servers) server.Dispose();
            throw;
        }
        return new SimulatedBenchHost(simulated, addresses, servers);
    }

    private static IDeviceServer Serve(InstrumentEntry instrument, IDevicePort port, TimeProvider clock)
    {
        var address = ResourceAddress.Parse(instrument.Address).Address;
        if (address is SerialAddress && (OperatingSystem.IsLinux() || OperatingSystem.IsMacOS())) return PseudoTerminalServer.Start(port, clock);
        return TcpDeviceServer.Start(port, clock, address is TcpAddress tcp ? tcp.Port : 0);
    }
}
