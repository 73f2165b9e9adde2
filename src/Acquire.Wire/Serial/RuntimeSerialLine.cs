using System.IO.Ports;

namespace Acquire.Wire;

/// <summary>A serial port through System.IO.Ports, for systems without the native back end.</summary>
/// <remarks>
/// One pump reads the base stream for as long as the port is open: an abandoned read of that stream would swallow the next
/// bytes, and some systems do not honour the token. On close the stream goes first, since disposing the port of an
/// unplugged adapter never returns otherwise.
/// </remarks>
internal sealed class RuntimeSerialLine : ISerialLine
{
    private readonly SerialAddress _address;
    private readonly SerialPort _port;
    private readonly Stream _stream;
    private readonly ReceiveBuffer _received;

    private RuntimeSerialLine(SerialAddress address, SerialPort port, ReceiveBuffer received)
    {
        (_address, _port, _received) = (address, port, received);
        _stream = port.BaseStream;
    }

    public string? Warning => null;

    public static RuntimeSerialLine Open(SerialAddress address, SerialSettings settings, ReceiveBuffer received)
    {
        var port = new SerialPort(address.Path, settings.Baud, ParityOf(settings.Parity), settings.DataBits, settings.StopBits == 1 ? StopBits.One : StopBits.Two)
        {
            Handshake = HandshakeOf(settings.Handshake),
        };
        try { port.Open(); }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or ArgumentException or InvalidOperationException)
        {
            port.Dispose();
            throw new LinkException($"{address.Text} cannot be opened: {(e.InnerException ?? e).Message}. Check the path, the adapter and your rights to the port.", e);
        }
        var line = new RuntimeSerialLine(address, port, received);
        _ = line.PumpAsync();
        return line;
    }

    public async ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation)
    {
        try { await _stream.WriteAsync(message, cancellation).ConfigureAwait(false); }
        catch (Exception e) when (e is IOException or ObjectDisposedException or InvalidOperationException or TimeoutException) { throw Gone(e); }
    }

    public void DropInput()
    {
        try { _port.DiscardInBuffer(); }
        catch (Exception e) when (e is IOException or InvalidOperationException) { throw Gone(e); }
    }

    public void Dispose()
    {
        try { _stream.Dispose(); }
        catch (IOException) { /* The adapter is gone; there is nothing left to close. */ }
        try { _port.Dispose(); }
        catch (IOException) { /* As above. */ }
    }

    private async Task PumpAsync()
    {
        var buffer = new byte[1024];
        try
        {
            while (true)
            {
                var read = await _stream.ReadAsync(buffer).ConfigureAwait(false);
                if (read == 0) break;
                _received.Append(buffer.AsSpan(0, read));
            }
            _received.Fail(Gone(null));
        }
        catch (Exception e) { _received.Fail(Gone(e)); }
    }

    private LinkException Gone(Exception? cause) =>
        new($"{_address.Text} is gone: {cause?.Message ?? "the port gave end of data"}. Check the adapter and its cable; the next exchange opens the port again.", cause);

    private static Parity ParityOf(SerialParity parity) => parity switch
    {
        SerialParity.Odd => Parity.Odd,
        SerialParity.Even => Parity.Even,
        _ => Parity.None,
    };

    private static Handshake HandshakeOf(SerialHandshake handshake) => handshake switch
    {
        SerialHandshake.RequestToSend => Handshake.RequestToSend,
        SerialHandshake.XOnXOff => Handshake.XOnXOff,
        _ => Handshake.None,
    };
}
