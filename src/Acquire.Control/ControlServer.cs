using System.Net.Sockets;
using System.Text;

namespace Acquire.Control;

/// <summary>Answers consoles over a local socket that only this account can reach. Every request is posted to the engine's loop.</summary>
public sealed class ControlServer : IAsyncDisposable
{
    private const int MostClients = 16;
    private readonly Socket _listener;
    private readonly string _path;
    private readonly RequestHandler _handler;
    private readonly CancellationTokenSource _end = new();
    private int _clients;
    private readonly Task _accepting;

    private ControlServer(Socket listener, string path, RequestHandler handler)
    {
        _listener = listener;
        _path = path;
        _handler = handler;
        _accepting = Task.Run(AcceptAsync);
    }

    /// <summary>Listens. A socket file that nobody listens on is removed; one that somebody listens on is an <see cref="IOException"/>.</summary>
    public static ControlServer Start(string socketPath, IControlTarget target, SynchronizationContext loop)
    {
        if (ControlSockets.Refusal(socketPath) is { } refusal)
        {
            throw new IOException(refusal);
        }

        var listener = new Socket(AddressFamily.Unix, SocketType.Stream, ProtocolType.Unspecified);
        try
        {
            if (File.Exists(socketPath))
            {
                RemoveStale(socketPath);
            }

            listener.Bind(new UnixDomainSocketEndPoint(socketPath));
            if (!OperatingSystem.IsWindows())
            {
                File.SetUnixFileMode(socketPath, UnixFileMode.UserRead | UnixFileMode.UserWrite);
            }

            listener.Listen(MostClients);
            return new(listener, socketPath, new RequestHandler(target, loop));
        }
        catch (SocketException problem)
        {
            listener.Dispose();
            throw new IOException($"The control socket {socketPath} cannot be opened: {problem.Message}. Check the runtime folder.", problem);
        }
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        _end.Cancel();
        _listener.Dispose();
        await _accepting.ConfigureAwait(false);
        File.Delete(_path);
        _end.Dispose();
    }

    private static void RemoveStale(string path)
    {
        if (new FileInfo(path).Length > 0)
        {
            throw new IOException($"{path}: this is a file and no socket; it is left alone. Move it away.");
        }

        using var probe = new Socket(AddressFamily.Unix, SocketType.Stream, ProtocolType.Unspecified);
        try
        {
            probe.Connect(new UnixDomainSocketEndPoint(path));
        }
        catch (SocketException)
        {
            File.Delete(path);
            return;
        }

        throw new IOException($"{path}: another engine listens there already.");
    }

    private async Task AcceptAsync()
    {
        var clients = new List<Task>();
        try
        {
            while (!_end.IsCancellationRequested)
            {
                var client = await _listener.AcceptAsync(_end.Token).ConfigureAwait(false);
                clients.RemoveAll(task => task.IsCompleted);
                clients.Add(Interlocked.Increment(ref _clients) <= MostClients ? ServeAsync(client) : TurnAwayAsync(client));
            }
        }
        catch (Exception ended) when (ended is OperationCanceledException or SocketException or ObjectDisposedException)
        {
            // The server was disposed.
        }

        await Task.WhenAll(clients).ConfigureAwait(false);
    }

    private async Task ServeAsync(Socket client)
    {
        try
        {
            using var stream = new NetworkStream(client, ownsSocket: true);
            using var reader = new LineReader(stream);
            try
            {
                while (await reader.ReadAsync(_end.Token).ConfigureAwait(false) is { } line)
                {
                    await SayAsync(stream, await _handler.AnswerAsync(line, _end.Token).ConfigureAwait(false)).ConfigureAwait(false);
                }
            }
            catch (InvalidDataException)
            {
                // A line beyond every message of ours: the client is not one of ours.
                await SayAsync(stream, RequestHandler.TooLong()).ConfigureAwait(false);
            }
        }
        catch (Exception gone) when (gone is IOException or OperationCanceledException or SocketException or ObjectDisposedException)
        {
            // The client left, or the server ends.
        }
        finally
        {
            client.Dispose();
            Interlocked.Decrement(ref _clients);
        }
    }

    private async Task TurnAwayAsync(Socket client)
    {
        try
        {
            using var stream = new NetworkStream(client, ownsSocket: true);
            await SayAsync(stream, RequestHandler.NoPlace(MostClients)).ConfigureAwait(false);
        }
        catch (Exception gone) when (gone is IOException or OperationCanceledException or SocketException or ObjectDisposedException)
        {
            // The client left, or the server ends.
        }
        finally
        {
            client.Dispose();
            Interlocked.Decrement(ref _clients);
        }
    }

    private async Task SayAsync(NetworkStream stream, string line) =>
        await stream.WriteAsync(Encoding.UTF8.GetBytes(line + "\n"), _end.Token).ConfigureAwait(false);
}
