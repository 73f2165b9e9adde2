using System.Net;
using System.Net.Sockets;
using Acquire.Wire;

namespace Acquire.Simulator.Serving;

/// <summary>A device on a raw TCP socket of the loopback interface, one client at a time.</summary>
/// <remarks>
/// Like many instruments it talks to one client; the next one waits in the queue until the first has gone. Runs on a
/// thread of its own. A client that breaks off is no error of the server: it turns to the next one.
/// </remarks>
public sealed class TcpDeviceServer : IDeviceServer
{
    private const int WaitingClients = 4;

    // A listener that fails again and again is dead; going on would only burn the processor.
    private const int MostFailuresInARow = 100;
    private static readonly TimeSpan LongestStop = TimeSpan.FromSeconds(10);
    private readonly IDevicePort _port;
    private readonly TimeProvider _clock;
    private readonly Socket _listener = new(AddressFamily.InterNetwork, SocketType.Stream, ProtocolType.Tcp);
    private readonly CancellationTokenSource _stop = new();
    private readonly Lock _gate = new();
    private readonly Thread _thread;
    private Socket? _client;

    private TcpDeviceServer(IDevicePort port, TimeProvider clock, int tcpPort)
    {
        _port = port;
        _clock = clock;
        _listener.Bind(new IPEndPoint(IPAddress.Loopback, tcpPort));
        _listener.Listen(WaitingClients);
        TcpPort = ((IPEndPoint)_listener.LocalEndPoint!).Port;
        _thread = new Thread(Serve) { IsBackground = true, Name = $"device on TCP port {TcpPort}" };
    }

    /// <summary>The port it listens on.</summary>
    public int TcpPort { get; }

    /// <inheritdoc/>
    public string Address => FormattableString.Invariant($"TCPIP::127.0.0.1::{TcpPort}::SOCKET");

    /// <summary>Serves a device; port 0 takes a free one.</summary>
    /// <exception cref="LinkException">The port is taken.</exception>
    public static TcpDeviceServer Start(IDevicePort port, TimeProvider clock, int tcpPort = 0)
    {
        try
        {
            var server = new TcpDeviceServer(port, clock, tcpPort);
            server._thread.Start();
            return server;
        }
        catch (SocketException problem)
        {
            throw new LinkException(
                FormattableString.Invariant($"TCP port {tcpPort} of 127.0.0.1 cannot be served: {problem.Message}. Write port 0 in the bench file to take a free one, or stop what uses it."),
                problem);
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        if (_stop.IsCancellationRequested) return;
        _stop.Cancel();
        _listener.Dispose();
        lock (_gate) _client?.Dispose();
        _thread.Join(LongestStop);
        _stop.Dispose();
    }

    private void Serve()
    {
        var failuresInARow = 0;
        while (!_stop.IsCancellationRequested && failuresInARow < MostFailuresInARow)
        {
            try
            {
                using var client = _listener.Accept();
                failuresInARow = 0;
                Converse(client);
            }
            catch (Exception problem) when (problem is SocketException or ObjectDisposedException or OperationCanceledException)
            {
                // The client broke off, or the server is being stopped: the condition of the loop tells which.
                failuresInARow++;
            }
        }
    }

    private void Converse(Socket client)
    {
        lock (_gate)
        {
            if (_stop.IsCancellationRequested) return;
            _client = client;
        }
        client.NoDelay = true;
        var conversation = new DeviceConversation(_port, _clock);
        var buffer = new byte[4096];
        _port.Connected(true);
        try
        {
            int received;
            while ((received = client.Receive(buffer)) > 0)
            {
                var reply = conversation.Exchange(buffer.AsSpan(0, received), _stop.Token);
                for (var sent = 0; sent < reply.Length;) sent += client.Send(reply.Span[sent..]);
            }
        }
        finally
        {
            _port.Connected(false);
            lock (_gate) _client = null;
        }
    }
}
