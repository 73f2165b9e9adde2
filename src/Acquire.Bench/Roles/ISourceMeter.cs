using Acquire.Bench.Readings;

namespace Acquire.Bench.Roles;

/// <summary>A source of voltage that measures the current it drives.</summary>
public interface ISourceMeter : IInstrument
{
    /// <summary>Full scales of the current ranges, ascending [A].</summary>
    IReadOnlyList<double> CurrentRangesA { get; }

    /// <summary>Sets the current limit [A] and the integration time in power-line cycles, and switches autorange off.</summary>
    ValueTask<CommandOutcome> ConfigureAsync(double currentLimitA, double integrationCycles, CancellationToken cancellation);

    /// <summary>Locks a current range by its full scale [A], one of <see cref="CurrentRangesA"/>.</summary>
    ValueTask<CommandOutcome> SetRangeAsync(double fullScaleA, CancellationToken cancellation);

    /// <summary>Sets the source voltage [V].</summary>
    ValueTask<CommandOutcome> SetBiasAsync(double biasV, CancellationToken cancellation);

    /// <summary>Switches the output.</summary>
    ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation);

    /// <summary>Takes one reading of current and voltage.</summary>
    ValueTask<SourceReading> ReadAsync(CancellationToken cancellation);
}

/// <summary>One reading of a source-meter.</summary>
/// <param name="CurrentA">Measured current [A]; carries Overrange or Compliance when the instrument says so.</param>
/// <param name="VoltageV">Measured voltage [V].</param>
public readonly record struct SourceReading(Measured CurrentA, Measured VoltageV);
