using System.Text.Json;
using System.Text.Json.Serialization;

namespace Acquire.Control;

/// <summary>Where a run is, as it goes over the socket.</summary>
public sealed record EngineStatusMessage(
    string RunId, string RunPath, string State, string Phase, int Leg, int Legs, int Point, int Points,
    double StageK, double SampleK, double TargetK, double TimeLeftS, long Committed, string Waiting);

/// <summary>How a command ended.</summary>
/// <param name="Done">True when the engine took it.</param>
/// <param name="Text">What it does, or why not, in words.</param>
public sealed record ControlOutcome(bool Done, string Text);

/// <summary>What a console may ask of an engine; called on the engine's loop only.</summary>
public interface IControlTarget
{
    /// <summary>Where the run is.</summary>
    EngineStatusMessage Status();

    /// <summary>Makes the bench safe at once.</summary>
    ControlOutcome MakeSafe(string operatorName, string? reason);

    /// <summary>Ends the run safely.</summary>
    ControlOutcome Stop(string operatorName, string? reason);

    /// <summary>Pauses the sequence.</summary>
    ControlOutcome Hold(string operatorName, string? reason);

    /// <summary>Goes on after a hold.</summary>
    ControlOutcome Continue(string operatorName, string? reason);
}

/// <summary>A request of JSON-RPC 2.0.</summary>
internal sealed record RpcRequest(string? Jsonrpc, JsonElement? Id, string? Method, RpcParameters? Params);

/// <summary>Parameters of every method here.</summary>
internal sealed record RpcParameters(int? Version, string? Operator, string? Reason);

/// <summary>A response of JSON-RPC 2.0.</summary>
internal sealed record RpcResponse(string Jsonrpc, JsonElement? Id, JsonElement? Result, RpcError? Error);

/// <summary>An error of JSON-RPC 2.0.</summary>
internal sealed record RpcError(int Code, string Message);

/// <summary>What hello answers.</summary>
internal sealed record HelloMessage(int Version, string RunId);

/// <summary>JSON of the messages, without reflection; NaN travels as a named literal.</summary>
[JsonSourceGenerationOptions(PropertyNamingPolicy = JsonKnownNamingPolicy.CamelCase, NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals, DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull)]
[JsonSerializable(typeof(RpcRequest))]
[JsonSerializable(typeof(RpcResponse))]
[JsonSerializable(typeof(EngineStatusMessage))]
[JsonSerializable(typeof(ControlOutcome))]
[JsonSerializable(typeof(HelloMessage))]
internal sealed partial class ControlJson : JsonSerializerContext;
