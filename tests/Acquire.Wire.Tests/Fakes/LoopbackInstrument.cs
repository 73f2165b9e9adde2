using System.Globalization;
using System.Net;
using System.Net.Sockets;
using System.Text;

namespace Acquire.Testing;

/// <summary>An instrument behind a real socket of the loopback interface; a test says what it does with each line.</summary>
internal sealed class LoopbackInstrument : IAsyncDisposable
{
    private readonly TcpListener _listener = new(IPAddress.Loopback, 0);
    private readonly CancellationTokenSource _end = new();
    private readonly Func<string, Connection, Task> _onLine;
    private readonly Task _serving;

    public LoopbackInstrument(Func<string, Connection, Task> onLine)
    {
        _onLine = onLine;
        _listener.Start();
        _serving = ServeAsync();
    }

    public LoopbackInstrument(Func<string, string> answer) : this((line, connection) => connection.SendAsync(answer(line) + "\n")) { }

    public int Connections { get; private set; }

    public string Address => string.Create(CultureInfo.InvariantCulture, $"TCPIP::127.0.0.1::{((IPEndPoint)_listener.LocalEndpoint).Port}::SOCKET");

    public async ValueTask DisposeAsync()
    {
        await _end.CancelAsync();
        await _serving;
        _listener.Stop();
        _end.Dispose();
    }

    private async Task ServeAsync()
    {
        try
        {
            while (true)
            {
                var socket = await _listener.AcceptSocketAsync(_end.Token).ConfigureAwait(false);
                Connections++;
                _ = ConnectionAsync(socket);
            }
        }
        catch (Exception e) when (e is OperationCanceledException or SocketException or ObjectDisposedException) { }
    }

    private async Task ConnectionAsync(Socket socket)
    {
        using var owned = socket;
        socket.NoDelay = true;
        var connection = new Connection(socket);
        var buffer = new byte[4096];
        var text = new StringBuilder();
        try
        {
            while (await socket.ReceiveAsync(buffer, SocketFlags.None, _end.Token).ConfigureAwait(false) is > 0 and var read)
            {
                foreach (var b in buffer.AsSpan(0, read).ToArray())
                {
                    if (b != '\n')
                    {
                        text.Append((char)b);
                        continue;
                    }
                    var line = text.ToString();
                    text.Clear();
                    await _onLine(line, connection).ConfigureAwait(false);
                }
            }
        }
        catch (Exception e) when (e is OperationCanceledException or SocketException or ObjectDisposedException) { }
    }

    internal sealed class Connection(Socket socket)
    {
        public async Task SendAsync(string bytes) => await socket.SendAsync(Encoding.Latin1.GetBytes(bytes), SocketFlags.None).ConfigureAwait(false);

        public void Close() => socket.Dispose();
    }
}
