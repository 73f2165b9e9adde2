using Acquire.Bench.Readings;

namespace Acquire.Bench.Roles;

/// <summary>A temperature controller with its heater, a stage sensor that it controls on and a sample sensor.</summary>
public interface ITemperatureLoop : IInstrument
{
    /// <summary>Reads stage and sample temperature, set point and heater power in one exchange.</summary>
    ValueTask<LoopReading> ReadAsync(CancellationToken cancellation);

    /// <summary>Asks the controller to approach a temperature [K] at a rate [K/s].</summary>
    ValueTask<CommandOutcome> SetPointAsync(double temperatureK, double rampKPerS, CancellationToken cancellation);

    /// <summary>Switches the heater output.</summary>
    ValueTask<CommandOutcome> HeaterAsync(bool on, CancellationToken cancellation);
}

/// <summary>One poll of a temperature loop.</summary>
/// <param name="StageK">Stage temperature [K].</param>
/// <param name="SampleK">Sample temperature [K].</param>
/// <param name="SetPointK">The set point the controller is working to now [K]; it moves during a ramp.</param>
/// <param name="HeaterW">Heater power [W].</param>
public readonly record struct LoopReading(Measured StageK, Measured SampleK, Measured SetPointK, Measured HeaterW);
