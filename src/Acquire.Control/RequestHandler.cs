using System.Text.Json;

namespace Acquire.Control;

/// <summary>One request line to one response line; the target is called on the loop.</summary>
internal sealed class RequestHandler(IControlTarget target, SynchronizationContext loop)
{
    private const int ParseError = -32700;
    private const int InvalidRequest = -32600;
    private const int MethodNotFound = -32601;
    private const int InvalidParameters = -32602;
    private const int InternalError = -32603;

    public async Task<string> AnswerAsync(string line, CancellationToken cancellation)
    {
        RpcRequest? request;
        try
        {
            request = JsonSerializer.Deserialize(line, ControlJson.Default.RpcRequest);
        }
        catch (JsonException)
        {
            return Error(null, ParseError, "This is not one JSON object on one line.");
        }

        try
        {
            return request is { Jsonrpc: "2.0", Method: not null }
                ? await MethodAsync(request, cancellation).ConfigureAwait(false)
                : Error(request?.Id, InvalidRequest, "This is not a request of JSON-RPC 2.0: jsonrpc and method are needed.");
        }
        catch (Exception fault) when (fault is not OperationCanceledException)
        {
            return Error(request?.Id, InternalError, "The engine could not answer: " + fault.Message);
        }
    }

    /// <summary>What a line beyond every bound is told before the connection closes.</summary>
    public static string TooLong() => Error(null, InvalidRequest, FormattableString.Invariant($"The line is longer than {LineReader.LongestLine} characters."));

    /// <summary>What a console beyond every place is told before the connection closes.</summary>
    public static string NoPlace(int places) => Error(null, InvalidRequest, FormattableString.Invariant($"All {places} places for consoles are taken; close one and try again."));

    private async Task<string> MethodAsync(RpcRequest request, CancellationToken cancellation)
    {
        switch (request.Method)
        {
            case "hello":
                if (request.Params?.Version != ControlSockets.Version)
                {
                    return Error(request.Id, InvalidParameters, FormattableString.Invariant($"This engine speaks version {ControlSockets.Version} of the control protocol, the console version {request.Params?.Version}. Use the same program for both."));
                }

                var status = await OnLoopAsync(target.Status, cancellation).ConfigureAwait(false);
                return Result(request.Id, JsonSerializer.SerializeToElement(new HelloMessage(ControlSockets.Version, status.RunId), ControlJson.Default.HelloMessage));
            case "status":
                return Result(request.Id, JsonSerializer.SerializeToElement(await OnLoopAsync(target.Status, cancellation).ConfigureAwait(false), ControlJson.Default.EngineStatusMessage));
            case "safe" or "stop" or "hold" or "continue":
                return await CommandAsync(request, cancellation).ConfigureAwait(false);
            default:
                return Error(request.Id, MethodNotFound, $"Unknown method '{request.Method}'; known are hello, status, safe, stop, hold, continue.");
        }
    }

    private async Task<string> CommandAsync(RpcRequest request, CancellationToken cancellation)
    {
        if (request.Params?.Operator is not { } who || string.IsNullOrWhiteSpace(who))
        {
            return Error(request.Id, InvalidParameters, "A command needs the operator's name; it is recorded.");
        }

        var outcome = await OnLoopAsync(
            () => request.Method switch
            {
                "safe" => target.MakeSafe(who, request.Params.Reason),
                "stop" => target.Stop(who, request.Params.Reason),
                "hold" => target.Hold(who, request.Params.Reason),
                _ => target.Continue(who, request.Params.Reason),
            },
            cancellation).ConfigureAwait(false);
        return Result(request.Id, JsonSerializer.SerializeToElement(outcome, ControlJson.Default.ControlOutcome));
    }

    private async Task<T> OnLoopAsync<T>(Func<T> call, CancellationToken cancellation)
    {
        var done = new TaskCompletionSource<T>(TaskCreationOptions.RunContinuationsAsynchronously);
        loop.Post(
            _ =>
            {
                try
                {
                    done.TrySetResult(call());
                }
                catch (Exception problem)
                {
                    done.TrySetException(problem);
                }
            },
            null);
        return await done.Task.WaitAsync(cancellation).ConfigureAwait(false);
    }

    private static string Result(JsonElement? id, JsonElement result) =>
        JsonSerializer.Serialize(new RpcResponse("2.0", id, result, null), ControlJson.Default.RpcResponse);

    private static string Error(JsonElement? id, int code, string message) =>
        JsonSerializer.Serialize(new RpcResponse("2.0", id, null, new RpcError(code, message)), ControlJson.Default.RpcResponse);
}
