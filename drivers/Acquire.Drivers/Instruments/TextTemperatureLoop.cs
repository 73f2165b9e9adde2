using Acquire.Bench.Roles;
using Acquire.Drivers.Files;

namespace Acquire.Drivers.Instruments;

/// <summary>A temperature controller that speaks text, as its driver file describes it.</summary>
public sealed class TextTemperatureLoop : ITemperatureLoop
{
    private readonly InstrumentTalk _talk;
    private readonly LoopCommands _commands;
    private readonly int _stage, _sample, _setPoint, _heater;

    internal TextTemperatureLoop(InstrumentTalk talk, LoopCommands commands)
    {
        (_talk, _commands) = (talk, commands);
        var reply = commands.Poll.Reply;
        (_stage, _sample, _setPoint, _heater) = (reply.IndexOf("stage"), reply.IndexOf("sample"), reply.IndexOf("set point"), reply.IndexOf("heater power"));
    }

    /// <inheritdoc/>
    public string Name => _talk.Name;

    /// <inheritdoc/>
    public string Address => _talk.Address;

    /// <inheritdoc/>
    public ValueTask<Identification> IdentifyAsync(CancellationToken cancellation) => _talk.IdentifyAsync(cancellation);

    /// <inheritdoc/>
    public async ValueTask<LoopReading> ReadAsync(CancellationToken cancellation)
    {
        var reply = await _talk.AskAsync(_commands.Poll, cancellation);
        var numbers = PolledNumbers.Read(_commands.Poll, reply);
        return new LoopReading(numbers[_stage], numbers[_sample], numbers[_setPoint], numbers[_heater]);
    }

    /// <inheritdoc/>
    public async ValueTask<CommandOutcome> SetPointAsync(double temperatureK, double rampKPerS, CancellationToken cancellation)
    {
        // The rate first: a set point taken at the old rate would already be on its way.
        var ramp = await _talk.SetAsync(_commands.Ramp, rampKPerS, cancellation);
        return ramp.Done ? await _talk.SetAsync(_commands.SetPoint, temperatureK, cancellation) : ramp;
    }

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> HeaterAsync(bool on, CancellationToken cancellation) => _talk.SwitchAsync(_commands.Heater, on, cancellation);

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> MakeSafeAsync(CancellationToken cancellation) => _talk.MakeSafeAsync(cancellation);

    /// <inheritdoc/>
    public ValueTask DisposeAsync() => _talk.DisposeAsync();
}
