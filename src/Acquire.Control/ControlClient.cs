using System.Net.Sockets;
using System.Text;
using System.Text.Json;

namespace Acquire.Control;

/// <summary>A console's end of the control socket. Never throws because an engine went away: it says so.</summary>
public sealed class ControlClient : IAsyncDisposable
{
    private static readonly TimeSpan AnswerBound = TimeSpan.FromSeconds(10);
    private readonly NetworkStream _stream;
    private readonly StreamReader _reader;
    private int _id;

    private ControlClient(Socket socket)
    {
        _stream = new NetworkStream(socket, ownsSocket: true);
        _reader = new StreamReader(_stream, new UTF8Encoding(false));
    }

    /// <summary>Connects and compares versions; the client, or why there is none.</summary>
    public static async Task<(ControlClient? Client, string? Problem)> ConnectAsync(string socketPath, CancellationToken cancellation)
    {
        var socket = await ControlSockets.ConnectAsync(socketPath, cancellation).ConfigureAwait(false);
        if (socket is null)
        {
            return (null, "No engine listens: the run is not running, or it runs under another account.");
        }

        var client = new ControlClient(socket);
        var answer = await client.AskAsync("hello", new RpcParameters(ControlSockets.Version, null, null), cancellation).ConfigureAwait(false);
        if (answer?.Error is null && answer?.Result is not null)
        {
            return (client, null);
        }

        await client.DisposeAsync().ConfigureAwait(false);
        return (null, answer?.Error?.Message ?? "The engine did not answer; it is not running any more, or hangs.");
    }

    /// <summary>Where the run is; null when the engine is gone.</summary>
    public async Task<EngineStatusMessage?> StatusAsync(CancellationToken cancellation) =>
        (await AskAsync("status", null, cancellation).ConfigureAwait(false))?.Result is { } result ? result.Deserialize(ControlJson.Default.EngineStatusMessage) : null;

    /// <summary>Sends a command: safe, stop, hold or continue.</summary>
    public async Task<ControlOutcome> SendAsync(string verb, string operatorName, string? reason, CancellationToken cancellation)
    {
        var answer = await AskAsync(verb, new RpcParameters(null, operatorName, reason), cancellation).ConfigureAwait(false);
        return answer?.Result is { } result && result.Deserialize(ControlJson.Default.ControlOutcome) is { } outcome
            ? outcome
            : new(false, answer?.Error?.Message ?? "The engine did not answer: it has ended, or hangs. Look at the bench.");
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        _reader.Dispose();
        await _stream.DisposeAsync().ConfigureAwait(false);
    }

    private async Task<RpcResponse?> AskAsync(string method, RpcParameters? parameters, CancellationToken cancellation)
    {
        using var bound = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        bound.CancelAfter(AnswerBound);
        try
        {
            var request = new RpcRequest("2.0", JsonSerializer.SerializeToElement(++_id, ControlIds.Default.Int32), method, parameters);
            await _stream.WriteAsync(Encoding.UTF8.GetBytes(JsonSerializer.Serialize(request, ControlJson.Default.RpcRequest) + "\n"), bound.Token).ConfigureAwait(false);
            return await ControlSockets.ReadLineAsync(_reader, bound.Token).ConfigureAwait(false) is { } line
                ? JsonSerializer.Deserialize(line, ControlJson.Default.RpcResponse)
                : null;
        }
        catch (Exception gone) when (gone is IOException or InvalidDataException or JsonException or SocketException or ObjectDisposedException
            || (gone is OperationCanceledException && !cancellation.IsCancellationRequested))
        {
            return null;
        }
    }
}

/// <summary>JSON of request numbers.</summary>
[System.Text.Json.Serialization.JsonSerializable(typeof(int))]
internal sealed partial class ControlIds : System.Text.Json.Serialization.JsonSerializerContext;
