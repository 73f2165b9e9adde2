namespace Acquire.Bench.Roles;

/// <summary>The opened instruments of a bench, by role.</summary>
/// <param name="Loop">Who heats, and reads the temperatures.</param>
/// <param name="Meter">Who applies the bias and reads the current.</param>
/// <param name="Lamp">Who lights the sample; null on a dark bench.</param>
public sealed record BenchInstruments(ITemperatureLoop Loop, ISourceMeter Meter, ILamp? Lamp)
{
    /// <summary>All instruments; heater first, as make-safe wants them.</summary>
    public IEnumerable<IInstrument> All => Lamp is null ? [Loop, Meter] : [Loop, Meter, Lamp];
}
