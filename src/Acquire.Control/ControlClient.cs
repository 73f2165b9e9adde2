using System.Net.Sockets;
using System.Text;
using System.Text.Json;

namespace Acquire.Control;

/// <summary>A console's end of the control socket. Never throws because an engine went away: it says so.</summary>
public sealed class ControlClient : IAsyncDisposable
{
    private const int MostLateAnswers = 64;
    private readonly NetworkStream _stream;
    private readonly LineReader _reader;
    private int _id;

    private ControlClient(Socket socket)
    {
        _stream = new NetworkStream(socket, ownsSocket: true);
        _reader = new LineReader(_stream);
    }

    /// <summary>Longest wait for an answer.</summary>
    internal TimeSpan AnswerBound { get; set; } = TimeSpan.FromSeconds(10);

    /// <summary>Connects and compares versions; the client, or why there is none.</summary>
    public static async Task<(ControlClient? Client, string? Problem)> ConnectAsync(string socketPath, CancellationToken cancellation)
    {
        if (ControlSockets.Refusal(socketPath) is { } refusal)
        {
            return (null, refusal);
        }

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
            : new(false, answer?.Error?.Message ?? "The engine did not answer in time: it has ended, or hangs. The command may still be carried out. Look at the bench.");
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
            return await AnswerToAsync(_id, bound.Token).ConfigureAwait(false);
        }
        catch (Exception gone) when (gone is IOException or InvalidDataException or JsonException or SocketException or ObjectDisposedException
            || (gone is OperationCanceledException && !cancellation.IsCancellationRequested))
        {
            return null;
        }
    }

    /// <summary>The answer to one request. A late answer to an earlier one is passed over: it must never stand for this one.</summary>
    private async Task<RpcResponse?> AnswerToAsync(int id, CancellationToken cancellation)
    {
        for (var late = 0; late < MostLateAnswers; late++)
        {
            if (await _reader.ReadAsync(cancellation).ConfigureAwait(false) is not { } line
                || JsonSerializer.Deserialize(line, ControlJson.Default.RpcResponse) is not { } answer)
            {
                return null;
            }

            var isOurs = answer.Id is { ValueKind: JsonValueKind.Number } number && number.TryGetInt32(out var found) && found == id;
            if (isOurs || (answer.Error is not null && answer.Id is null or { ValueKind: JsonValueKind.Null }))
            {
                return answer; // an error without a number speaks of the connection itself
            }
        }

        return null;
    }
}

/// <summary>JSON of request numbers.</summary>
[System.Text.Json.Serialization.JsonSerializable(typeof(int))]
internal sealed partial class ControlIds : System.Text.Json.Serialization.JsonSerializerContext;
