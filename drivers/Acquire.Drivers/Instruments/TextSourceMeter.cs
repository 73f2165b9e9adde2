using Acquire.Bench.Readings;
using Acquire.Bench.Roles;
using Acquire.Drivers.Files;

namespace Acquire.Drivers.Instruments;

/// <summary>A source-meter that speaks text, as its driver file describes it.</summary>
public sealed class TextSourceMeter : ISourceMeter
{
    private readonly InstrumentTalk _talk;
    private readonly MeterCommands _commands;
    private readonly int _current, _voltage, _status;

    internal TextSourceMeter(InstrumentTalk talk, MeterCommands commands)
    {
        (_talk, _commands) = (talk, commands);
        var reply = commands.Read.Reply;
        (_current, _voltage, _status) = (reply.IndexOf("current"), reply.IndexOf("voltage"), reply.IndexOf("status"));
    }

    /// <inheritdoc/>
    public string Name => _talk.Name;

    /// <inheritdoc/>
    public string Address => _talk.Address;

    /// <inheritdoc/>
    public IReadOnlyList<double> CurrentRangesA => _commands.RangesA;

    /// <inheritdoc/>
    public ValueTask<Identification> IdentifyAsync(CancellationToken cancellation) => _talk.IdentifyAsync(cancellation);

    /// <inheritdoc/>
    public async ValueTask<CommandOutcome> ConfigureAsync(double currentLimitA, double integrationCycles, CancellationToken cancellation)
    {
        var outcome = await _talk.CommandAsync(_commands.AutorangeOff, cancellation);
        if (outcome.Done) outcome = await _talk.SetAsync(_commands.CurrentLimit, currentLimitA, cancellation);
        if (outcome.Done) outcome = await _talk.SetAsync(_commands.Integration, integrationCycles, cancellation);
        return outcome;
    }

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> SetRangeAsync(double fullScaleA, CancellationToken cancellation) =>
        _talk.SetAsync(_commands.Range, fullScaleA, cancellation);

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> SetBiasAsync(double biasV, CancellationToken cancellation) => _talk.SetAsync(_commands.Bias, biasV, cancellation);

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation) => _talk.SwitchAsync(_commands.Output, on, cancellation);

    /// <inheritdoc/>
    public async ValueTask<SourceReading> ReadAsync(CancellationToken cancellation)
    {
        var reply = await _talk.AskAsync(_commands.Read, cancellation);
        var numbers = PolledNumbers.Read(_commands.Read, reply);
        var current = _status < 0 ? numbers[_current] : WithStatus(numbers[_current], numbers[_status], reply.Text);
        return new SourceReading(current, numbers[_voltage]);
    }

    /// <inheritdoc/>
    public ValueTask<CommandOutcome> MakeSafeAsync(CancellationToken cancellation) => _talk.MakeSafeAsync(cancellation);

    /// <inheritdoc/>
    public ValueTask DisposeAsync() => _talk.DisposeAsync();

    // A current whose status cannot be read is not known to be unlimited, hence not good.
    private Measured WithStatus(Measured current, Measured status, string raw)
    {
        var against = current.Quality;
        if (!status.IsGood || status.Value is < 0 or > int.MaxValue || status.Value != Math.Floor(status.Value))
            against |= status.IsGood ? Quality.Unreadable : status.Quality;
        else
        {
            if (IsSet(_commands.ComplianceBit, (int)status.Value)) against |= Quality.Compliance;
            if (IsSet(_commands.OverloadBit, (int)status.Value)) against |= Quality.Overrange;
        }
        return against == current.Quality ? current : Measured.Bad(against, raw, current.Value);
    }

    private static bool IsSet(int? bit, int status) => bit is { } place && (status >> place & 1) != 0;
}
