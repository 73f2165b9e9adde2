using Acquire.Bench.Roles;
using Acquire.Drivers.Files;

namespace Acquire.Drivers.Instruments;

/// <summary>A lamp that speaks text, as its driver file describes it.</summary>
public sealed class TextLamp : ILamp
{
    private readonly InstrumentTalk _talk;
    private readonly LampCommands _commands;
    private readonly int _drive, _monitor;

    internal TextLamp(InstrumentTalk talk, LampCommands commands)
    {
        (_talk, _commands) = (talk, commands);
        (_drive, _monitor) = (commands.Poll.Reply.IndexOf("drive"), commands.Poll.Reply.IndexOf("monitor"));
    }

    /// <inheritdoc/>
    public string Name => _talk.Name;

    /// <inheritdoc/>
    public string Address => _talk.Address;

    /// <inheritdoc/>
    public ValueTask<Identification> IdentifyAsync(CancellationToken cancellation) => _talk.IdentifyAsync(cancellation);

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> SetDriveAsync(double driveA, CancellationToken cancellation) => _talk.SetAsync(_commands.Drive, driveA, cancellation);

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation) => _talk.SwitchAsync(_commands.Output, on, cancellation);

    /// <inheritdoc/>
    public async ValueTask<LampReading> ReadAsync(CancellationToken cancellation)
    {
        var reply = await _talk.AskAsync(_commands.Poll, cancellation);
        var numbers = PolledNumbers.Read(_commands.Poll, reply);
        return new LampReading(numbers[_drive], numbers[_monitor]);
    }

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> MakeSafeAsync(CancellationToken cancellation) => _talk.MakeSafeAsync(cancellation);

    /// <inheritdoc/>
    public ValueTask DisposeAsync() => _talk.DisposeAsync();
}
