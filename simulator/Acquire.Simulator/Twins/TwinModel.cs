using Acquire.Simulator.Instruments;
using Acquire.Simulator.Samples;
using Acquire.Simulator.Thermal;

namespace Acquire.Simulator.Twins;

/// <summary>Everything the simulator knows about a bench: holder, sample and instruments, with their true values.</summary>
/// <param name="Title">Name of the twin.</param>
/// <param name="Holder">Stage and sample as heat stores.</param>
/// <param name="Controller">Temperature controller.</param>
/// <param name="Meter">Source-meter.</param>
/// <param name="Lamp">Lamp, or none.</param>
/// <param name="Sample">The invented sample.</param>
public sealed record TwinModel(
    string Title, HolderModel Holder, ControllerModel Controller, MeterModel Meter, LampModel? Lamp, SampleModel Sample);
