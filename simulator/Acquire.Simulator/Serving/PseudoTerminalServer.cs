using System.Runtime.Versioning;
using Acquire.Wire;

namespace Acquire.Simulator.Serving;

/// <summary>A device on a pseudo-terminal, which a client opens like a serial port.</summary>
/// <remarks>A serial line does not tell who has opened it: the device sees one client from beginning to end.</remarks>
[SupportedOSPlatform("linux")]
[SupportedOSPlatform("macos")]
public sealed class PseudoTerminalServer : IDeviceServer
{
    private static readonly TimeSpan LongestStop = TimeSpan.FromSeconds(10);
    private readonly IDevicePort _port;
    private readonly DeviceConversation _conversation;
    private readonly PseudoTerminal _terminal = new();
    private readonly CancellationTokenSource _stop = new();
    private readonly Thread _thread;

    private PseudoTerminalServer(IDevicePort port, TimeProvider clock)
    {
        _port = port;
        _conversation = new DeviceConversation(port, clock);
        _thread = new Thread(Serve) { IsBackground = true, Name = $"device on {_terminal.Path}" };
    }

    /// <summary>Path of the terminal that a client opens.</summary>
    public string Path => _terminal.Path;

    /// <inheritdoc/>
    public string Address => $"ASRL{Path}::INSTR";

    /// <summary>Serves a device on a fresh pseudo-terminal.</summary>
    /// <exception cref="LinkException">The system gives no pseudo-terminal.</exception>
    public static PseudoTerminalServer Start(IDevicePort port, TimeProvider clock)
    {
        var server = new PseudoTerminalServer(port, clock);
        server._thread.Start();
        return server;
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        if (_stop.IsCancellationRequested) return;
        _stop.Cancel();
        _terminal.Wake();
        // The descriptors are closed only when the thread has let go of them: a number closed early may be given to another file.
        if (_thread.Join(LongestStop)) _terminal.Dispose();
        _stop.Dispose();
    }

    private void Serve()
    {
        var buffer = new byte[4096];
        _port.Connected(true);
        try
        {
            while (!_stop.IsCancellationRequested)
            {
                var received = _terminal.Read(buffer);
                if (received == 0) continue;
                _terminal.Write(_conversation.Exchange(buffer.AsSpan(0, received), _stop.Token).Span);
            }
        }
        catch (Exception problem) when (problem is OperationCanceledException or LinkException)
        {
            // Stopped while the device was busy, or the system took the terminal away: the line is dead, as when a cable is pulled.
        }
        finally
        {
            _port.Connected(false);
        }
    }
}
