using System.Globalization;
using System.Net.Sockets;

namespace Acquire.Wire;

/// <summary>A raw TCP socket to an instrument.</summary>
/// <remarks>
/// One write per message and no Nagle delay: a query sent in two writes with Nagle on costs 40 ms.
/// Keep-alive notices within about 8 s an instrument that was switched off, since that sends no FIN.
/// </remarks>
public sealed class TcpLink(TcpAddress address) : ILink
{
    private readonly byte[] _waste = new byte[512];
    private Socket? _socket;

    /// <inheritdoc/>
    public string Address => address.Text;

    /// <inheritdoc/>
    public bool IsOpen => _socket is not null;

    /// <inheritdoc/>
    public bool ReopenSeparates => true;

    /// <inheritdoc/>
    public async ValueTask OpenAsync(CancellationToken cancellation)
    {
        Close();
        if (address.Port == 0)
            throw new LinkException($"{Address} cannot be opened: port 0 stands for 'any free port' of a simulated bench. Serve the bench first, or write the instrument's port.");
        var socket = new Socket(SocketType.Stream, ProtocolType.Tcp) { NoDelay = true };
        try
        {
            KeepAlive(socket);
            await socket.ConnectAsync(address.Host, address.Port, cancellation).ConfigureAwait(false);
        }
        catch (SocketException e)
        {
            socket.Dispose();
            throw new LinkException($"{Address} cannot be opened: {e.Message}. Check that the instrument is on, that its network address is right and that no other program holds its connection.", e);
        }
        catch
        {
            socket.Dispose();
            throw;
        }
        _socket = socket;
    }

    /// <inheritdoc/>
    public ValueTask WriteAsync(ReadOnlyMemory<byte> message, CancellationToken cancellation)
    {
        var socket = Opened();
        ValueTask<int> sending;
        try { sending = socket.SendAsync(message, SocketFlags.None, cancellation); }
        catch (Exception e) when (IsGone(e)) { throw Gone(e); }
        if (!sending.IsCompletedSuccessfully) return FinishWriteAsync(socket, sending, message, cancellation);
        // The kernel takes a short message at once, so the state machine below is rarely needed.
        var sent = sending.Result;
        return sent == message.Length ? ValueTask.CompletedTask : FinishWriteAsync(socket, ValueTask.FromResult(sent), message, cancellation);
    }

    private async ValueTask FinishWriteAsync(Socket socket, ValueTask<int> sending, ReadOnlyMemory<byte> message, CancellationToken cancellation)
    {
        try
        {
            var sent = await sending.ConfigureAwait(false);
            while (sent < message.Length)
                sent += await socket.SendAsync(message[sent..], SocketFlags.None, cancellation).ConfigureAwait(false);
        }
        catch (Exception e) when (IsGone(e)) { throw Gone(e); }
    }

    /// <inheritdoc/>
    public async ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellation)
    {
        var socket = Opened();
        int read;
        try { read = await socket.ReceiveAsync(buffer, SocketFlags.None, cancellation).ConfigureAwait(false); }
        catch (Exception e) when (IsGone(e)) { throw Gone(e); }
        return read > 0 ? read : throw Gone(null);
    }

    /// <inheritdoc/>
    public ValueTask DiscardInputAsync(CancellationToken cancellation)
    {
        var socket = Opened();
        try
        {
            // Bounded: an instrument that floods is stopped by the reply limit of the exchange, not here.
            for (var i = 0; i < 256 && socket.Poll(0, SelectMode.SelectRead); i++)
                if (socket.Receive(_waste) == 0) throw Gone(null);
        }
        catch (Exception e) when (IsGone(e)) { throw Gone(e); }
        return ValueTask.CompletedTask;
    }

    /// <inheritdoc/>
    public void Close() => Interlocked.Exchange(ref _socket, null)?.Dispose();

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        Close();
        return ValueTask.CompletedTask;
    }

    private static void KeepAlive(Socket socket)
    {
        socket.SetSocketOption(SocketOptionLevel.Socket, SocketOptionName.KeepAlive, true);
        socket.SetSocketOption(SocketOptionLevel.Tcp, SocketOptionName.TcpKeepAliveTime, 5);
        socket.SetSocketOption(SocketOptionLevel.Tcp, SocketOptionName.TcpKeepAliveInterval, 1);
        socket.SetSocketOption(SocketOptionLevel.Tcp, SocketOptionName.TcpKeepAliveRetryCount, 3);
    }

    private static bool IsGone(Exception e) => e is SocketException or ObjectDisposedException;

    private Socket Opened() => _socket ?? throw new LinkException($"{Address} is closed. Open it first.");

    private LinkException Gone(Exception? cause)
    {
        Close();
        var why = cause switch
        {
            null => "closed by the instrument",
            SocketException s => string.Create(CultureInfo.InvariantCulture, $"{s.Message} ({s.SocketErrorCode})"),
            _ => "closed on our side",
        };
        return new LinkException($"{Address} is gone: {why}. Check the instrument's power and network; the next exchange opens the link again.", cause);
    }
}
