using Acquire.Bench.Readings;

namespace Acquire.Bench.Roles;

/// <summary>A light source driven by a current, with a monitor detector.</summary>
public interface ILamp : IInstrument
{
    /// <summary>Sets the drive current [A]; the light stays off until <see cref="OutputAsync"/>.</summary>
    ValueTask<CommandOutcome> SetDriveAsync(double driveA, CancellationToken cancellation);

    /// <summary>Switches the light.</summary>
    ValueTask<CommandOutcome> OutputAsync(bool on, CancellationToken cancellation);

    /// <summary>Reads drive current and monitor current in one exchange.</summary>
    ValueTask<LampReading> ReadAsync(CancellationToken cancellation);
}

/// <summary>One poll of a lamp.</summary>
/// <param name="DriveA">Drive current [A], zero when off.</param>
/// <param name="MonitorA">Current of the monitor detector [A].</param>
public readonly record struct LampReading(Measured DriveA, Measured MonitorA);
